using Cronos;
using Portfolio.Server.Http;

namespace Portfolio.Server.Schedules;

/// <summary>
/// When a schedule is due: at most once per local date, at the first time of the date that the cron expression names. A time that does not
/// exist that day is due at the first instant after the gap, one that exists twice the first time.
/// </summary>
/// <param name="cron">Five fields, <see cref="Parse"/>.</param>
/// <param name="zone">The zone of local dates.</param>
internal sealed class DueTimes(CronExpression cron, TimeZoneInfo zone)
{
    // 29 February comes after eight years at the latest; on a given weekday after forty.
    private const int FarthestDays = 41 * 366;

    private const int Fields = 5;

    /// <summary>The expression; null when it has not five fields that can be read, or names a time that never comes.</summary>
    public static CronExpression? Parse(string text)
    {
        var fields = text.Split((char[])[' ', '\t'], StringSplitOptions.RemoveEmptyEntries);
        if (fields.Length != Fields || !CronExpression.TryParse(text, CronFormat.Standard, out var cron))
            return null;
        return cron.GetNextOccurrence(DateTime.UnixEpoch) is null ? null : cron;
    }

    /// <summary>The instant at which a date is due; null when it is not, or the zone leaves the whole date out.</summary>
    public DateTimeOffset? On(DateOnly date)
    {
        // Times of day are read as if they were UTC, where every day is whole; the zone comes in afterwards.
        var midnight = DateTime.SpecifyKind(date.ToDateTime(TimeOnly.MinValue), DateTimeKind.Utc);
        if (cron.GetNextOccurrence(midnight, inclusive: true) is not { } time || DateOnly.FromDateTime(time) != date)
            return null;
        var instant = LocalDates.InstantOf(time, zone);
        return LocalDates.Of(instant, zone) == date ? instant : null;
    }

    /// <summary>Due dates whose instants lie after <paramref name="after"/> and not after <paramref name="until"/>, latest first.</summary>
    public IEnumerable<(DateOnly Date, DateTimeOffset At)> Between(DateTimeOffset after, DateTimeOffset until)
    {
        var first = LocalDates.Of(after, zone);
        for (var date = LocalDates.Of(until, zone); date >= first; date = date.AddDays(-1))
        {
            if (On(date) is { } at && at > after && at <= until)
                yield return (date, at);
        }
    }

    /// <summary>
    /// What a sweep has to make: the latest date that has become due, unless it or a later one was made already. Earlier ones that were
    /// missed stay missing.
    /// </summary>
    /// <param name="since">When the schedule was set.</param>
    /// <param name="made">The latest due date that has its run.</param>
    public (DateOnly Date, DateTimeOffset At)? Latest(DateTimeOffset since, DateTimeOffset now, DateOnly? made)
    {
        foreach (var due in Between(since, now))
            return due.Date <= made ? null : due;
        return null;
    }

    /// <summary>
    /// The first due instant after <paramref name="after"/> of a date later than <paramref name="beyond"/>; null when none comes within
    /// decades.
    /// </summary>
    public DateTimeOffset? Next(DateTimeOffset after, DateOnly? beyond)
    {
        var date = LocalDates.Of(after, zone);
        if (beyond >= date)
            date = beyond.Value.AddDays(1);
        for (var days = 0; days < FarthestDays; days++, date = date.AddDays(1))
        {
            if (On(date) is { } at && at > after)
                return at;
        }
        return null;
    }
}
