namespace Portfolio.Server.Contracts.Results;

/// <summary>How one figure of one scope has moved from run to run.</summary>
public sealed record SeriesJson
{
    public required string Scope { get; init; }

    /// <summary><c>finish</c>, <c>cost</c> or <c>contingency</c>.</summary>
    public required string Metric { get; init; }

    /// <summary>Confidence level in percent.</summary>
    public required decimal Level { get; init; }

    /// <summary><c>run</c>, <c>day</c>, <c>week</c> or <c>month</c>: the last point of each stands for it.</summary>
    public required string Every { get; init; }

    /// <summary>By date.</summary>
    public required IReadOnlyList<SeriesPointJson> Points { get; init; }
}

/// <summary>One date of a series. Finishes are dates, all else amounts; a value that the run does not have is absent.</summary>
public sealed record SeriesPointJson
{
    public required DateOnly AsOf { get; init; }

    public required string Run { get; init; }

    public required long Revision { get; init; }

    public DateOrMoney? Value { get; init; }

    public DateOrMoney? SamplingLow { get; init; }

    public DateOrMoney? SamplingHigh { get; init; }

    public DateOrMoney? Base { get; init; }

    /// <summary>Of a finish: calendar days since the point before; positive is later.</summary>
    public int? ChangeDays { get; init; }

    /// <summary>Of money: what was added since the point before.</summary>
    public decimal? Change { get; init; }
}
