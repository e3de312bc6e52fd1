using System.Text.Json;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Outbox;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Events;

/// <summary>
/// Whether the probability of keeping a commitment has fallen below what is wished: below it now, and at the point before not, or there was
/// none. So it is told when the line is crossed and not every night.
/// </summary>
internal sealed class CommitmentWatch(RunStore runs, ResultStore results)
{
    public async Task<NoticedEvent?> LookAsync(StoredRun run, WantedEventJson wish, CancellationToken cancellation)
    {
        var now = await ReadAsync(run, wish, cancellation);
        if (now is not { Probability: { } probability } || (decimal)probability >= wish.Probability)
            return null;
        var point = await runs.FindPointAsync(Caller.System, run.Portfolio, run.AsOf.AddDays(-1), cancellation);
        var before = point is null ? null : await ReadAsync(point, wish, cancellation);
        if (before is { Probability: { } earlier } && (decimal)earlier < wish.Probability)
            return null;
        var payload = Wish.Payload(
            wish, ("asOf", run.AsOf), ("run", run.Id), ("revision", run.Revision), ("commitment", now.Promised),
            ("probability", probability),
            ("previous", before is null ? null : new { point!.AsOf, Run = point.Id, point.Revision, before.Probability }));
        var once = $"{Wish.NameOf(wish)}/{run.AsOf:yyyy-MM-dd}";
        return new NoticedEvent(once, EventTypes.CommitmentBelow, wish.Scope!, Scope.Parse(wish.Scope)!.Project, payload);
    }

    private async Task<Kept?> ReadAsync(StoredRun run, WantedEventJson wish, CancellationToken cancellation)
    {
        if (await results.FindAsync(Caller.System, run.Portfolio, run.Id, wish.Scope!, cancellation) is not { } row)
            return null;
        var result = JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!;
        return wish.Metric == Metrics.Cost
            ? result.Cost?.Commitment is { } budget ? new Kept(new DateOrMoney(budget.Budget), budget.Probability) : null
            : result.Finish.Commitment is { } finish ? new Kept(new DateOrMoney(finish.Date), finish.Probability) : null;
    }

    private sealed record Kept(DateOrMoney Promised, double? Probability);
}
