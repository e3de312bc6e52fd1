using System.Collections.ObjectModel;

namespace Portfolio.Model.Documents;

/// <summary>One capital project: its estimates, progress and risks.</summary>
public sealed record Project
{
    public required string Id { get; init; }

    public string? Name { get; init; }

    public string? Programme { get; init; }

    public IReadOnlyDictionary<string, string> Tags { get; init; } = ReadOnlyDictionary<string, string>.Empty;

    /// <summary>1 is served first by shared pools.</summary>
    public int Priority { get; init; } = 100;

    /// <summary>Progress is reported up to the beginning of this day.</summary>
    public required DateOnly StatusDate { get; init; }

    /// <summary>Null: the portfolio's default calendar.</summary>
    public string? Calendar { get; init; }

    public Commitments? Commitments { get; init; }

    /// <summary>Rank correlation between the estimates of this project, 0…0.99; null when not stated (counts as 0).</summary>
    public double? Correlation { get; init; }

    /// <summary>Drivers that act on every activity.</summary>
    public IReadOnlyList<string> Drivers { get; init; } = [];

    public Overhead? Overhead { get; init; }

    public IReadOnlyList<Activity> Activities { get; init; } = [];

    public IReadOnlyList<RiskEvent> RiskEvents { get; init; } = [];

    public IReadOnlyList<ChanceBranches> ChanceBranches { get; init; } = [];
}

/// <summary>Running cost: money per working day of the project's calendar, and what has been spent already.</summary>
public sealed record Overhead(double PerDay, decimal Actual);
