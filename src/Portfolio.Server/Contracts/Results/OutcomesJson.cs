namespace Portfolio.Server.Contracts.Results;

/// <summary>Histogram and cumulative table of a metric of a scope: the chance of being done by each date, or within each amount.</summary>
public sealed record OutcomesJson
{
    public required string Scope { get; init; }

    public required string Run { get; init; }

    public required DateOnly AsOf { get; init; }

    public required long Revision { get; init; }

    /// <summary><c>finish</c> or <c>cost</c>.</summary>
    public required string Metric { get; init; }

    /// <summary>Iterations in which it happens; all shares are over these.</summary>
    public required int Iterations { get; init; }

    /// <summary>Rising, without gaps.</summary>
    public required IReadOnlyList<BinJson> Bins { get; init; }
}

/// <summary>One bin, both ends included. Shares are 0–1.</summary>
/// <param name="Count">Iterations in it.</param>
/// <param name="Cumulative">Share of the iterations in this bin or before.</param>
public sealed record BinJson(DateOrMoney From, DateOrMoney To, int Count, double Share, double Cumulative);
