namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Programs and data from outside, which are not part of the project: the folder <c>shared</c> beside the repository, or the one that
/// PORTFOLIO_SHARED names; for data alone also PORTFOLIO_DATA. Tests that need what is not there are skipped with that reason.
/// </summary>
internal static class SharedFolder
{
    /// <summary>True when tests that take long are wanted too.</summary>
    public static bool Long => Environment.GetEnvironmentVariable("PORTFOLIO_LONG") == "1";

    private static string Root =>
        Environment.GetEnvironmentVariable("PORTFOLIO_SHARED") ?? Path.GetFullPath(Path.Combine(Repository.Root, "..", "shared"));

    /// <summary>A program among the checks; skips the test where there is none.</summary>
    public static string Check(string name) => Existing(Path.Combine(Root, "checks", name));

    /// <summary>A file or folder among the data; skips the test where there is none.</summary>
    public static string Data(params string[] names) =>
        Existing(Path.Combine([Environment.GetEnvironmentVariable("PORTFOLIO_DATA") ?? Path.Combine(Root, "data"), .. names]));

    private static string Existing(string path)
    {
        if (!Path.Exists(path))
            Assert.Skip($"{path} is not there; set PORTFOLIO_SHARED or PORTFOLIO_DATA to run this comparison.");
        return path;
    }
}
