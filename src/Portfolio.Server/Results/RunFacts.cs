namespace Portfolio.Server.Results;

/// <summary>What the builder of results must know about a run beside its plan and samples.</summary>
/// <param name="Run">Its id.</param>
/// <param name="AsOf">The local date it stands for.</param>
/// <param name="PartHashes">Content hashes of the document's parts, settings first, then the projects in document order.</param>
/// <param name="Overlay">A scenario laid over the revision, or null.</param>
public sealed record RunFacts(
    string Run, DateOnly AsOf, long Revision, long Seed, int Iterations, IReadOnlyList<string> PartHashes, byte[]? Overlay = null);
