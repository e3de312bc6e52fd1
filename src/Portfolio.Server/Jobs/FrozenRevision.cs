using Portfolio.Engine;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Jobs;

/// <summary>The revision of a run, read once and compiled.</summary>
/// <param name="PartHashes">Content hashes of its parts, settings first, then the projects in document order.</param>
internal sealed record FrozenRevision(Plan Plan, IReadOnlyList<string> PartHashes)
{
    /// <exception cref="RunFailed">The revision cannot be simulated; the message says why.</exception>
    public static async Task<FrozenRevision> ReadAsync(DocumentStore documents, StoredRun run, CancellationToken cancellation)
    {
        var stored = await documents.ReadAsync(Caller.System, run.Portfolio, run.Revision, cancellation)
            ?? throw new RunFailed($"Revision {run.Revision} is not there.");
        return new FrozenRevision(Compile(stored), [.. stored.Parts.Select(part => part.Hash)]);
    }

    private static Plan Compile(StoredDocument stored)
    {
        var document = DocumentReader.FromParts(
            stored.Parts[0].Bytes, [.. stored.Parts.Skip(1).Select(part => (ReadOnlyMemory<byte>)part.Bytes)]);
        if (document.Projects.All(project => project.Activities.Count == 0))
            throw new RunFailed("No project has any activity, so there is nothing whose finish could be forecast.");
        // Checked when it was written; but rules grow, and an old revision may break one of today's.
        var valid = ValidPortfolio.Check(document, out var faults)
            ?? throw new RunFailed($"The revision breaks a rule of the model: {faults[0].Message}{Others(faults.Count - 1)}");
        try
        {
            return Plan.Compile(valid);
        }
        catch (ArgumentException contradiction)
        {
            throw new RunFailed($"The revision cannot be simulated: {contradiction.Message}", contradiction);
        }
    }

    private static string Others(int count) => count == 0 ? "" : $" ({count} more)";
}
