namespace Portfolio.Model.Documents;

/// <summary>
/// A whole portfolio as its office states it. Defaults are filled in; ids are as sent and compared ordinally. May still break rules:
/// only <see cref="Rules.ValidPortfolio"/> is known not to.
/// </summary>
public sealed record PortfolioDocument(Settings Settings, IReadOnlyList<Project> Projects);
