namespace Portfolio.Store.Access;

/// <summary>
/// The SQL condition that every query on a portfolio's data carries. It reads the parameters <c>@Caller</c> (a key's id) and <c>@Now</c>,
/// and holds only while that key lives. Arguments are column names or parameters, never values.
/// </summary>
internal static class Granted
{
    private static readonly Right[] AnyRight = Enum.GetValues<Right>();

    /// <summary>The right on the whole portfolio.</summary>
    public static string Whole(Right right, string portfolio) =>
        Exists(RightsTable.SufficientFor(right), portfolio, "and g.project is null");

    /// <summary>The right on one project: by a grant on the whole portfolio or on that project. A null project needs the former.</summary>
    public static string Part(Right right, string portfolio, string project) => Part([right], portfolio, project);

    /// <summary>One of several rights on one project.</summary>
    public static string Part(Right[] rights, string portfolio, string project) =>
        Exists(
            [.. rights.SelectMany(RightsTable.SufficientFor).Distinct()], portfolio, $"and (g.project is null or g.project = {project})");

    /// <summary>The right on some of the portfolio, perhaps only on single projects.</summary>
    public static string Some(Right right, string portfolio) => Exists(RightsTable.SufficientFor(right), portfolio, "");

    /// <summary>Any right at all on some of the portfolio: who has none must not learn that it exists.</summary>
    public static string Any(string portfolio) => Exists(AnyRight, portfolio, "");

    /// <summary>The right on all portfolios, present and to come.</summary>
    public static string Everywhere(Right right) => Whole(right, "'*'");

    private static string Exists(Right[] sufficient, string portfolio, string project) => $"""
        exists (select 1 from key_grant g join api_key k on k.id = g.key
          where g.key = @Caller and k.revoked_at is null and (k.expires_at is null or k.expires_at > @Now)
            and g.granted in ({string.Join(", ", sufficient.Select(right => $"'{RightsTable.Word(right)}'"))})
            and g.portfolio in ('*', {portfolio}) {project})
        """;
}
