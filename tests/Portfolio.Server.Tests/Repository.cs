namespace Portfolio.Server.Tests;

/// <summary>The checkout that the tests were built from.</summary>
internal static class Repository
{
    public static string Root
    {
        get
        {
            var folder = new DirectoryInfo(AppContext.BaseDirectory);
            while (!File.Exists(Path.Combine(folder.FullName, "Portfolio.sln")))
                folder = folder.Parent ?? throw new DirectoryNotFoundException("Portfolio.sln");
            return folder.FullName;
        }
    }
}
