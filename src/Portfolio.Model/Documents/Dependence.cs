using Portfolio.Model.Distributions;

namespace Portfolio.Model.Documents;

/// <summary>A common cause: with <see cref="Probability"/> it happens and multiplies durations and costs of what it acts on.</summary>
public sealed record Driver(string Id, string? Name, double Probability, Distribution? DurationFactor, Distribution? CostFactor);

/// <summary>How the estimates of different projects move together, as rank (Spearman) correlations; contract section 4, item 1.</summary>
public sealed record Dependence
{
    /// <summary>0…0.99, between any two projects.</summary>
    public double BetweenProjects { get; init; }

    /// <summary>Between two projects of one programme, at least <see cref="BetweenProjects"/>; null: the same.</summary>
    public double? WithinProgramme { get; init; }

    public IReadOnlyList<RankPair> Pairs { get; init; } = [];

    public MatrixRepair Repair { get; init; }

    /// <summary>True when the office stated anything at all; a default of independence deserves a caution.</summary>
    public bool Stated { get; init; }
}

/// <summary>
/// Rank correlation, −1…1, of two nodes: <c>driver/{id}</c>, <c>project/{id}</c>, <c>portfolio</c> or <c>programme/{id}</c>.
/// </summary>
public readonly record struct RankPair(string First, string Second, double Rank);

/// <summary>What to do with correlations that contradict each other.</summary>
public enum MatrixRepair
{
    Refuse,

    /// <summary>Replace by the nearest correlation matrix (Higham 2002).</summary>
    Nearest,
}
