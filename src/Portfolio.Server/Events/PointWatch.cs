using System.Data.Common;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Events;

/// <summary>
/// What follows from a run that has become the newest point of the series: levels that moved, commitments that became unlikely. Reads only;
/// what it finds is written with the step that hands the run's own event on.
/// </summary>
internal sealed class PointWatch(RunStore runs, LevelWatch levels, CommitmentWatch commitments, ILogger<PointWatch> log)
{
    /// <param name="told">Any event; only of runs that succeeded something follows.</param>
    public async Task<IReadOnlyList<NoticedEvent>> LookAsync(
        OutboxEvent told, IEnumerable<WantedEventJson> wishes, CancellationToken cancellation)
    {
        WantedEventJson[] looked = [.. wishes.Where(wish => wish.Type is EventTypes.LevelMoved or EventTypes.CommitmentBelow).Distinct()];
        if (told.Kind != EventTypes.RunSucceeded || looked.Length == 0 || await PointAsync(told, cancellation) is not { } point)
            return [];
        var noticed = new List<NoticedEvent>();
        foreach (var wish in looked)
        {
            try
            {
                var found = wish.Type == EventTypes.LevelMoved
                    ? await levels.LookAsync(point, wish, cancellation)
                    : await commitments.LookAsync(point, wish, cancellation);
                if (found is not null)
                    noticed.Add(found);
            }
            catch (Exception failure) when (failure is StoreDamagedException
                or not (OperationCanceledException or IOException or DbException))
            {
                // One figure that cannot be read must not hold up what everybody else waits for.
                EventLog.LookFailed(log, point.Id, wish.Type!, failure);
            }
        }
        return noticed;
    }

    /// <summary>The run, when it stands for its date and was the newest point as it ended: filling in the past moves nothing.</summary>
    private async Task<StoredRun?> PointAsync(OutboxEvent told, CancellationToken cancellation)
    {
        var run = await runs.FindAsync(Caller.System, told.Portfolio, told.Subject, cancellation);
        if (run is not { Represents: true })
            return null;
        var later = await runs.ListPointsAsync(Caller.System, told.Portfolio, run.AsOf.AddDays(1), null, cancellation);
        return later.Any(point => point.FinishedAt <= run.FinishedAt) ? null : run;
    }
}
