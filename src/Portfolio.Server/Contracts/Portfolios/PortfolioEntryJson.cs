using Portfolio.Store.Documents;

namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>A portfolio as listed.</summary>
public sealed record PortfolioEntryJson
{
    public required string Portfolio { get; init; }

    /// <summary>The newest revision.</summary>
    public required long Revision { get; init; }

    public required DateTimeOffset CreatedAt { get; init; }

    /// <summary>Present when it is archived: readable, no more writes or runs.</summary>
    public DateTimeOffset? ArchivedAt { get; init; }

    internal static PortfolioEntryJson From(PortfolioEntry entry) => new()
    {
        Portfolio = entry.Id, Revision = entry.Revision, CreatedAt = entry.CreatedAt, ArchivedAt = entry.ArchivedAt,
    };
}
