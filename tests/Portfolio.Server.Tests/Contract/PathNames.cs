namespace Portfolio.Server.Tests.Contract;

/// <summary>What stands for the parameters of addresses in tests over all operations.</summary>
internal static class PathNames
{
    /// <summary>Of a portfolio that holds a project <c>seen</c>, and of a run of it.</summary>
    public static Dictionary<string, string> Of(string portfolio, string run) => new()
    {
        ["portfolio"] = portfolio,
        ["run"] = run,
        ["number"] = "1",
        ["programme"] = "seen-programme",
        ["project"] = "seen",
        ["activity"] = "M",
        ["key"] = "0123456789abcdef",
    };

    public static Dictionary<string, string> With(this IReadOnlyDictionary<string, string> names, string parameter, string value) =>
        new(names) { [parameter] = value };
}
