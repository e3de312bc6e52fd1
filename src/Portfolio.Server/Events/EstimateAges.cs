using System.Globalization;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Outbox;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Events;

/// <summary>
/// Looks once per local date at which projects' progress is older than wished. A project is told of once for each status date, so it is
/// not told of again until it is renewed and grows old anew. Projects whose work is all finished do not grow old.
/// </summary>
internal sealed class EstimateAges(
    SubscriptionStore subscriptions, DocumentStore documents, RevisionOfDate dates, EventDistribution distribution, TimeProvider clock,
    ILogger<EstimateAges> log)
{
    public async Task LookAsync(CancellationToken cancellation)
    {
        var active = await subscriptions.ListActiveAsync(Caller.System, null, cancellation);
        foreach (var portfolio in active.Select(Listener.Of).GroupBy(listener => listener.Portfolio))
        {
            var wishes = portfolio.SelectMany(listener => listener.Wishes).Where(wish => wish.Type == EventTypes.EstimatesStale).Distinct();
            foreach (var wish in wishes)
                await TryAsync(portfolio.Key, wish, cancellation);
        }
    }

    private async Task TryAsync(string portfolio, WantedEventJson wish, CancellationToken cancellation)
    {
        try
        {
            await LookAsync(portfolio, wish, cancellation);
        }
        catch (Exception failure) when (failure is not OperationCanceledException)
        {
            // One portfolio that cannot be read must not hold up the others.
            EventLog.AgesFailed(log, portfolio, failure);
        }
    }

    private async Task LookAsync(string portfolio, WantedEventJson wish, CancellationToken cancellation)
    {
        var today = LocalDates.Of(clock.GetUtcNow(), await dates.ZoneAsync(portfolio, cancellation));
        var look = $"{Wish.NameOf(wish)}/{Text(today)}";
        if (await distribution.IsTakenAsync(portfolio, look, cancellation))
            return;
        var document = await documents.ReadAsync(Caller.System, portfolio, null, cancellation);
        var noticed = new List<NoticedEvent>();
        foreach (var part in document?.Parts.Skip(1) ?? [])
        {
            var project = DocumentReader.OfStored.ReadProject(part.Bytes);
            if (IsOpen(project) && Age(project, today) is { } days && days > wish.Days)
                noticed.Add(Notice(wish, project, today, days));
        }
        await distribution.TellAsync(portfolio, look, noticed, cancellation);
    }

    private static bool IsOpen(ProjectJson project) => project.Activities?.Any(activity => activity.ActualFinish is null) == true;

    private static int? Age(ProjectJson project, DateOnly today) =>
        DateOnly.TryParseExact(project.StatusDate, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var status)
            ? today.DayNumber - status.DayNumber
            : null;

    private static NoticedEvent Notice(WantedEventJson wish, ProjectJson project, DateOnly today, int days) => new(
        $"{Wish.NameOf(wish)}/{project.Id}/{project.StatusDate}", EventTypes.EstimatesStale, $"project/{project.Id}", project.Id,
        Wish.Payload(
            wish, ("asOf", today), ("project", project.Id), ("statusDate", project.StatusDate), ("ageDays", days)));

    private static string Text(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}
