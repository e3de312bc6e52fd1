namespace Portfolio.Server.Contracts.Subscriptions;

/// <summary>What a subscription wants to be told of. Members that the type does not know are refused.</summary>
public sealed record WantedEventJson
{
    /// <summary>
    /// <c>run.succeeded</c>, <c>run.failed</c>, <c>run.cancelled</c>, <c>revision.created</c>, <c>post.refused</c> (of each key once
    /// a minute), <c>level.moved</c>, <c>commitment.belowProbability</c> or <c>estimates.stale</c>.
    /// </summary>
    public string? Type { get; init; }

    /// <summary>
    /// Of levels and commitments: <c>portfolio</c> (usual), <c>programme/p</c>, <c>project/p</c> or <c>milestone/p/a</c>.
    /// </summary>
    public string? Scope { get; init; }

    /// <summary>Of levels: <c>finish</c> (usual), <c>cost</c> or <c>contingency</c>; of commitments the first two.</summary>
    public string? Metric { get; init; }

    /// <summary>Of levels: the confidence level; usually 80.</summary>
    public decimal? Level { get; init; }

    /// <summary>Of levels: more calendar days than this, either way. Of estimates: reported longer ago than this.</summary>
    public decimal? Days { get; init; }

    /// <summary>Of levels of money: more than this, either way.</summary>
    public decimal? Amount { get; init; }

    /// <summary>Of levels: since the last point of the <c>run</c>, <c>day</c>, <c>week</c> (usual) or <c>month</c> before.</summary>
    public string? Every { get; init; }

    /// <summary>Of commitments: told when the probability, 0–1, falls below this.</summary>
    public decimal? Probability { get; init; }
}
