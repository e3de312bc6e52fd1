using System.Collections.ObjectModel;
using Portfolio.Model.Distributions;

namespace Portfolio.Model.Documents;

/// <summary>Work to be done, or a milestone. Durations are working days of the activity's calendar.</summary>
public sealed record Activity
{
    public required string Id { get; init; }

    public string? Name { get; init; }

    /// <summary>True: no duration, cost or demand; reported on its own.</summary>
    public bool Milestone { get; init; }

    /// <summary>Promised date; only of a milestone.</summary>
    public DateOnly? Commitment { get; init; }

    /// <summary>Null only for milestones and finished work.</summary>
    public Distribution? Duration { get; init; }

    public ActivityCost? Cost { get; init; }

    public IReadOnlyList<Link> Predecessors { get; init; } = [];

    public IReadOnlyList<Demand> Demands { get; init; } = [];

    public IReadOnlyList<string> Drivers { get; init; } = [];

    /// <summary>Null: the project's calendar.</summary>
    public string? Calendar { get; init; }

    public DateOnly? EarliestStart { get; init; }

    public IReadOnlyDictionary<string, string> Tags { get; init; } = ReadOnlyDictionary<string, string>.Empty;

    public DateOnly? ActualStart { get; init; }

    public DateOnly? ActualFinish { get; init; }

    /// <summary>Working days still to go; only of work that has started and not finished.</summary>
    public Distribution? Remaining { get; init; }

    public bool Finished => ActualFinish is not null;

    public bool Started => ActualStart is not null || Finished;

    public bool UnderWay => ActualStart is not null && !Finished;
}

/// <summary>Cost to go, fixed and per working day, and what has been spent.</summary>
public sealed record ActivityCost(Distribution? Fixed, Distribution? PerDay, decimal Actual);

/// <summary>A link from a predecessor, written <c>A05</c> or <c>project/A05</c>, with its lag in working days (negative: a lead).</summary>
public readonly record struct Link(string Activity, LinkType Type = LinkType.FinishToStart, double Lag = 0);

/// <summary>What of the predecessor holds what of the successor.</summary>
public enum LinkType
{
    FinishToStart,
    StartToStart,
    FinishToFinish,
    StartToFinish,
}
