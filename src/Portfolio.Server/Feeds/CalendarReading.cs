using Portfolio.Engine.Results;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Feeds;

/// <summary>The calendar of a run, a function of what is stored alone: the same bytes whenever it is asked for.</summary>
internal sealed class CalendarReading(DocumentStore documents, RunStore runs, ResultReading results)
{
    /// <summary>
    /// How many times the figures have changed along the series up to this run: rises with every change, stays while they are the same.
    /// </summary>
    public async Task<int> SequenceAsync(SeenRun run, CancellationToken cancellation)
    {
        var digests = await runs.ListDigestsAsync(run.Caller, run.Portfolio, run.Run.AsOf, cancellation);
        digests.Add(run.Run.ResultDigest!);
        return digests.Zip(digests.Skip(1)).Count(pair => pair.First != pair.Second);
    }

    public async Task<byte[]> ReadAsync(SeenRun run, Level level, int sequence, CancellationToken cancellation)
    {
        // The names of what the caller sees anyway; no right to the document is asked for.
        var document = await documents.ReadAsync(Caller.System, run.Portfolio, run.Run.Revision, cancellation)
            ?? throw new InvalidOperationException($"Revision {run.Run.Revision} is not there.");
        var names = ScopeNames.Of(document);
        var rows = await results.ListAsync(run, 0, int.MaxValue, [level], cancellation);
        var entries = new CalendarEntries(run.Portfolio, level, names, new RunStamp(run.Id, run.Run.AsOf, run.Run.Revision));
        var name = run.Caller.Holds(Right.Read, run.Portfolio) ? names.Whole : run.Portfolio;
        return CalendarText.Of(entries.Of(rows.Items, KeptWarnings.Read(run).Of), name, sequence, run.Run.FinishedAt!.Value);
    }

    /// <summary>80 when it is one of the configured levels, else the greatest of these.</summary>
    public async Task<Level> UsualLevelAsync(SeenRun run, CancellationToken cancellation)
    {
        var part = await documents.ReadPartAsync(Caller.System, run.Portfolio, PartNames.Settings, run.Run.Revision, cancellation)
            ?? throw new InvalidOperationException($"Revision {run.Run.Revision} has no settings.");
        var settings = DocumentReader.OfStored.ReadSettings(part.Bytes).ToModel(new Reading(), "/settings");
        var configured = RunLevels.Configured(settings);
        return configured.Count == 0 || configured.Contains(LevelParameter.Usual) ? LevelParameter.Usual : configured.Max();
    }
}
