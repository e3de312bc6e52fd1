using Portfolio.Store.Access;

namespace Portfolio.Store.Schedules;

/// <summary>When a portfolio is run by itself.</summary>
public sealed record StoredSchedule
{
    public required string Portfolio { get; init; }
    /// <summary>Five fields, read in the portfolio's time zone.</summary>
    public required string Cron { get; init; }
    /// <summary>Null: as in the settings.</summary>
    public int? Iterations { get; init; }
    public required bool Enabled { get; init; }
    /// <summary>When it was last set: instants before it are not missed ones.</summary>
    public required DateTimeOffset ChangedAt { get; init; }
}

/// <summary>How setting a schedule ended.</summary>
public enum SchedulePutOutcome
{
    Stored,
    Unchanged,
    NotFound,
    Forbidden,
    Archived,
}

/// <summary>Schedules, one to a portfolio.</summary>
public sealed class ScheduleStore(Database database)
{
    public Task<StoredSchedule?> FindAsync(Caller caller, string portfolio, CancellationToken cancellation) => throw new NotSupportedException(database.ToString());

    /// <summary>Sets the schedule, with an audit entry. Needs <see cref="Right.Manage"/>.</summary>
    public Task<SchedulePutOutcome> PutAsync(Caller caller, string portfolio, string cron, int? iterations, bool enabled, CancellationToken cancellation) => throw new NotSupportedException();

    /// <summary>The enabled schedules of all portfolios that the caller manages and that are not archived.</summary>
    public Task<IReadOnlyList<StoredSchedule>> ListEnabledAsync(Caller caller, CancellationToken cancellation) => throw new NotSupportedException();
}
