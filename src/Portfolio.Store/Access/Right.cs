namespace Portfolio.Store.Access;

/// <summary>What a key may do with a portfolio.</summary>
public enum Right
{
    Read,
    Submit,
    Manage,
    Finance,
    Admin,
}

/// <summary>Which rights include which: the one table behind <see cref="Caller"/> and behind the SQL predicates.</summary>
internal static class RightsTable
{
    private static readonly Right[][] Sufficient =
    [
        [Right.Read, Right.Manage, Right.Admin],
        [Right.Submit, Right.Manage, Right.Admin],
        [Right.Manage, Right.Admin],
        [Right.Finance, Right.Admin],
        [Right.Admin],
    ];

    /// <summary>The rights of which any one suffices where <paramref name="needed"/> is asked for.</summary>
    public static Right[] SufficientFor(Right needed) => Sufficient[(int)needed];

    public static string Word(Right right) => right switch
    {
        Right.Read => "read",
        Right.Submit => "submit",
        Right.Manage => "manage",
        Right.Finance => "finance",
        _ => "admin",
    };

    public static Right Parse(string word) => word switch
    {
        "read" => Right.Read,
        "submit" => Right.Submit,
        "manage" => Right.Manage,
        "finance" => Right.Finance,
        "admin" => Right.Admin,
        _ => throw new FormatException($"Unknown right '{word}'."),
    };
}
