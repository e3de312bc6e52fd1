using System.Text.Json.Serialization;
using Portfolio.Engine.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Contracts.Results;

/// <summary>
/// The money to hold above the base so that the portfolio keeps within it at a level, and how it is shared out. The allocations make the
/// total.
/// </summary>
public sealed record ContingencyJson
{
    public required string Run { get; init; }

    public required DateOnly AsOf { get; init; }

    public required long Revision { get; init; }

    /// <summary>Confidence level in percent.</summary>
    public required decimal Level { get; init; }

    public required decimal Base { get; init; }

    public required decimal CostAtLevel { get; init; }

    /// <summary>Cost at the level less base.</summary>
    public required decimal Total { get; init; }

    /// <summary>What the projects would need together if each held its own.</summary>
    public required decimal SumOfStandalone { get; init; }

    /// <summary>What holding it together saves; negative where levels under-add.</summary>
    public required decimal Diversification { get; init; }

    /// <summary>Projects in document order.</summary>
    public required IReadOnlyList<AllocationJson> Allocations { get; init; }

    public required IReadOnlyList<WarningJson> Warnings { get; init; }

    internal static ContingencyJson From(StoredRun run, Contingency contingency, int digits, IReadOnlyList<WarningJson> warnings) => new()
    {
        Run = run.Id,
        AsOf = run.AsOf,
        Revision = run.Revision,
        Level = contingency.Level.Percent,
        Base = MinorUnits.ToMoney(contingency.Base, digits),
        CostAtLevel = MinorUnits.ToMoney(contingency.CostAtLevel, digits),
        Total = MinorUnits.ToMoney(contingency.Total, digits),
        SumOfStandalone = MinorUnits.ToMoney(contingency.SumOfStandalone, digits),
        Diversification = MinorUnits.ToMoney(contingency.Diversification, digits),
        Allocations = [.. contingency.Allocations.Select(allocation => AllocationJson.From(allocation, digits))],
        Warnings = warnings,
    };
}

/// <summary>One project's part of the contingency.</summary>
public sealed record AllocationJson
{
    public required string Project { get; init; }

    public required decimal Base { get; init; }

    /// <summary>Its share of the total.</summary>
    public required decimal Allocated { get; init; }

    /// <summary>Half the 95 % sampling interval of what is allocated; absent below 20 iterations.</summary>
    public decimal? Error { get; init; }

    /// <summary>Its own cost at the level less its base.</summary>
    public required decimal Standalone { get; init; }

    /// <summary>Allocated over total; null when the total is not positive.</summary>
    [JsonIgnore(Condition = JsonIgnoreCondition.Never)]
    public required double? Share { get; init; }

    internal static AllocationJson From(Allocation allocation, int digits) => new()
    {
        Project = allocation.Project,
        Base = MinorUnits.ToMoney(allocation.Base, digits),
        Allocated = MinorUnits.ToMoney(allocation.Allocated, digits),
        Error = allocation.Error is { } error ? MinorUnits.ToMoney(error, digits) : null,
        Standalone = MinorUnits.ToMoney(allocation.Standalone, digits),
        Share = allocation.Share,
    };
}
