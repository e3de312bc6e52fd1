using System.Text.Json.Serialization;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Schedules;

/// <summary>When a portfolio is run by itself.</summary>
public sealed record ScheduleJson
{
    /// <summary>Minute, hour, day of month, month, weekday, in the time zone of the settings; due at most once per local date.</summary>
    public string? Cron { get; init; }

    /// <summary>Whole number 10…1,000,000. Left out: that of the settings.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Iterations { get; init; }

    /// <summary>Left out: true.</summary>
    public bool? Enabled { get; init; }
}

/// <summary>The schedule with what has become of it.</summary>
public sealed record ScheduleStandingJson
{
    public required string Cron { get; init; }

    public int? Iterations { get; init; }

    public required bool Enabled { get; init; }

    public required ScheduleStatusJson Status { get; init; }
}

/// <summary>What has become of a schedule.</summary>
public sealed record ScheduleStatusJson
{
    /// <summary>Absent while it is disabled.</summary>
    public DateTimeOffset? NextDue { get; init; }

    /// <summary>The last due dates, latest first.</summary>
    public required IReadOnlyList<DueRunJson> LastRuns { get; init; }
}

/// <summary>A date on which a run was due.</summary>
public sealed record DueRunJson
{
    public required DateOnly AsOf { get; init; }

    /// <summary>State of its run; missed when it has none.</summary>
    public required string State { get; init; }

    /// <summary>Id of its run.</summary>
    public string? Run { get; init; }

    public DateTimeOffset? FinishedAt { get; init; }
}
