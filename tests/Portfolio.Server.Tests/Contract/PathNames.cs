namespace Portfolio.Server.Tests.Contract;

/// <summary>What stands for the parameters of addresses in tests over all operations.</summary>
internal static class PathNames
{
    /// <summary>Of a portfolio that holds a project <c>seen</c> and a subscription <c>office</c>, of a run of it and of a delivery.</summary>
    public static Dictionary<string, string> Of(string portfolio, string run, string delivery = "none") => new()
    {
        ["portfolio"] = portfolio,
        ["run"] = run,
        ["number"] = "1",
        ["programme"] = "seen-programme",
        ["project"] = "seen",
        ["activity"] = "M",
        ["key"] = "0123456789abcdef",
        ["subscription"] = "office",
        ["delivery"] = delivery,
    };

    public static Dictionary<string, string> With(this IReadOnlyDictionary<string, string> names, string parameter, string value) =>
        new(names) { [parameter] = value };
}
