namespace Portfolio.Model.Documents;

/// <summary>A crew or machine that projects share; capacity in units, changing at the beginning of the named days.</summary>
public sealed record Pool(string Id, string? Name, double Capacity, IReadOnlyList<CapacityChange> CapacityChanges);

/// <summary>Capacity from the beginning of a day on.</summary>
public readonly record struct CapacityChange(DateOnly From, double Capacity);

/// <summary>How a pool is shared; contract section 4, item 7.</summary>
public enum PoolRule
{
    /// <summary>At each instant the first in the order that is ready and fits is started.</summary>
    Passing,

    /// <summary>Nothing starts before what stands before it in the order and draws on one of its pools.</summary>
    InOrder,
}

/// <summary>Units of a pool held from the start of an activity to its finish.</summary>
public readonly record struct Demand(string Pool, double Units);
