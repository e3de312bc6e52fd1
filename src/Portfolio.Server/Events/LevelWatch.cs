using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Events;

/// <summary>
/// Whether a level has moved by more than is wished since the last interval: the newest point against the last point of the nearest
/// earlier interval that has one, as the series shows it. Told once per interval and direction.
/// </summary>
internal sealed class LevelWatch(SeriesReading series, PortfolioFacts facts)
{
    // Holds two whole months, the longest intervals; where runs are rarer the whole series is read.
    private const int DaysBack = 62;

    public async Task<NoticedEvent?> LookAsync(StoredRun run, WantedEventJson wish, CancellationToken cancellation)
    {
        var scope = Scope.Parse(wish.Scope)!;
        var points = await PointsAsync(run, scope, wish, run.AsOf.AddDays(-DaysBack), cancellation);
        if (points.Count == 1)
            points = await PointsAsync(run, scope, wish, null, cancellation);
        if (points.Count < 2 || points[^1].Run != run.Id)
            return null;
        var (before, now) = (points[^2], points[^1]);
        var (moved, limit) = now.ChangeDays is { } days ? (days, wish.Days) : (now.Change ?? 0, wish.Amount);
        if (Math.Abs(moved) <= limit)
            return null;
        var weekEnds = (await facts.OfAsync(run.Portfolio, null, cancellation)).WeekEnds;
        var interval = Intervals.NameOf(run.AsOf, wish.Every!, weekEnds);
        var payload = Wish.Payload(
            wish, ("asOf", run.AsOf), ("run", run.Id), ("revision", run.Revision), ("value", now.Value), ("changeDays", now.ChangeDays),
            ("change", now.Change), ("previous", new { before.AsOf, before.Run, before.Revision, before.Value }));
        var once = $"{Wish.NameOf(wish)}/{interval}/{(moved > 0 ? "up" : "down")}";
        return new NoticedEvent(once, EventTypes.LevelMoved, wish.Scope!, scope.Project, payload);
    }

    private async Task<IReadOnlyList<SeriesPointJson>> PointsAsync(
        StoredRun run, Scope scope, WantedEventJson wish, DateOnly? from, CancellationToken cancellation)
    {
        var asked = new SeriesQuestion(
            Caller.System, run.Portfolio, scope, wish.Metric!, Level.Of(wish.Level!.Value), wish.Every!, from, run.AsOf);
        try
        {
            return (await series.ReadAsync(asked, cancellation))?.Points ?? [];
        }
        catch (RequestRefused)
        {
            // The level is one of those of settings that have changed since: no run keeps it any more.
            return [];
        }
    }
}
