using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Keys;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access.Tokens;

/// <summary>
/// Rights as the values of a claim state them: <c>right:portfolio</c>, <c>right:*</c> or <c>right:portfolio/project</c>, each value alone
/// or several with spaces between. Values of another form belong to others and grant nothing.
/// </summary>
internal static class TokenRights
{
    public static IReadOnlyList<Grant> Of(IEnumerable<string> values) =>
    [
        .. values.SelectMany(value => value.Split(' ', StringSplitOptions.RemoveEmptyEntries))
            .Select(Read).OfType<(Right Right, string Portfolio, string? Project)>()
            .GroupBy(stated => (stated.Right, stated.Portfolio, Limited: stated.Project is not null))
            .Select(group => new Grant(
                group.Key.Right, group.Key.Portfolio,
                group.Key.Limited ? [.. group.Select(stated => stated.Project!).Distinct(StringComparer.Ordinal)] : null)),
    ];

    private static (Right, string, string?)? Read(string value)
    {
        var colon = value.IndexOf(':', StringComparison.Ordinal);
        if (colon < 0 || RightWords.All.Meaning(value[..colon]) is not { } right)
            return null;
        var reach = value[(colon + 1)..];
        if (reach == Grant.Everywhere)
            return (right, reach, null);
        var parts = reach.Split('/');
        return parts.Length <= 2 && parts.All(TextChecks.IsId) ? (right, parts[0], parts.ElementAtOrDefault(1)) : null;
    }
}
