namespace Portfolio.Store.Access;

/// <summary>A right on one portfolio, or on all of them (<see cref="Everywhere"/>).</summary>
/// <param name="Right">What may be done.</param>
/// <param name="Portfolio">The portfolio's id, or <c>*</c>.</param>
/// <param name="Projects">The only projects it reaches; null when it reaches the whole portfolio.</param>
public sealed record Grant(Right Right, string Portfolio, IReadOnlyList<string>? Projects = null)
{
    public const string Everywhere = "*";
}

/// <summary>
/// Who asks: a key with the grants it had when it was looked up. Every query asks again in SQL, so a key that is revoked meanwhile finds
/// nothing.
/// </summary>
public sealed record Caller(string KeyId, string Name, IReadOnlyList<Grant> Grants)
{
    /// <summary>The server's own jobs: a key row without a secret, which nobody can present, holding <c>admin</c> everywhere.</summary>
    public static readonly Caller System = new("system", "system", [new Grant(Right.Admin, Grant.Everywhere)]);

    /// <summary>True when there is any grant on the portfolio: what separates 403 from 404.</summary>
    public bool Knows(string portfolio) => Grants.Any(grant => Reaches(grant, portfolio));

    /// <summary>True when the whole portfolio is reached with <paramref name="right"/> or one that includes it.</summary>
    public bool Holds(Right right, string portfolio) =>
        Grants.Any(grant => Suffices(grant, right) && Reaches(grant, portfolio) && grant.Projects is null);

    /// <summary>True when this project of the portfolio is reached with <paramref name="right"/> or one that includes it.</summary>
    public bool Holds(Right right, string portfolio, string project) =>
        Grants.Any(grant =>
            Suffices(grant, right) && Reaches(grant, portfolio) && grant.Projects?.Contains(project, StringComparer.Ordinal) != false);

    /// <summary>True when some part of the portfolio, perhaps only single projects, is reached with the right.</summary>
    public bool HoldsSomewhere(Right right, string portfolio) => Grants.Any(grant => Suffices(grant, right) && Reaches(grant, portfolio));

    private static bool Reaches(Grant grant, string portfolio) => grant.Portfolio is Grant.Everywhere || grant.Portfolio == portfolio;

    private static bool Suffices(Grant grant, Right right) => RightsTable.SufficientFor(right).Contains(grant.Right);
}
