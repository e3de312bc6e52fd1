namespace Portfolio.Model.Rules;

/// <summary>Largest sizes a document may have; an installation can set others (contract section 2).</summary>
public sealed record ModelLimits
{
    public static readonly ModelLimits Default = new();

    public int Projects { get; init; } = 500;

    /// <summary>Activities in one project.</summary>
    public int Activities { get; init; } = 5_000;

    /// <summary>Different nodes named by the pairs of the dependence.</summary>
    public int PairedNodes { get; init; } = 500;

    /// <summary>Points or outcomes of one distribution.</summary>
    public int Points { get; init; } = 1_000;

    /// <summary>Stated dates of one calendar, working and not.</summary>
    public int CalendarDates { get; init; } = 5_000;

    /// <summary>Capacity changes of one pool.</summary>
    public int CapacityChanges { get; init; } = 1_000;

    public int MinIterations { get; init; } = 10;

    public int MaxIterations { get; init; } = 1_000_000;

    /// <summary>Confidence levels of the settings.</summary>
    public int Levels { get; init; } = 99;
}
