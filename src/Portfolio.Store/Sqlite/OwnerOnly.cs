namespace Portfolio.Store.Sqlite;

/// <summary>
/// Files that nobody but their owner reads: what signs for subscriptions stands in them. Windows has no modes; there the folder's own
/// rights decide.
/// </summary>
internal static class OwnerOnly
{
    private const UnixFileMode Owner = UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute;

    /// <summary>A folder that is there already keeps its mode: it is the operator's.</summary>
    public static void MakeDirectory(string directory)
    {
        if (OperatingSystem.IsWindows())
            Directory.CreateDirectory(directory);
        else
            Directory.CreateDirectory(directory, Owner);
    }

    /// <summary>Makes an empty file where there is none. The database makes its companions with the mode of its file.</summary>
    public static void MakeFile(string file)
    {
        if (OperatingSystem.IsWindows() || Path.Exists(file))
            return;
        new FileStream(file, new FileStreamOptions
        {
            Mode = FileMode.OpenOrCreate,
            Access = FileAccess.Write,
            UnixCreateMode = UnixFileMode.UserRead | UnixFileMode.UserWrite,
        }).Dispose();
    }

    /// <summary>Takes from files whatever they allow to others.</summary>
    public static void Keep(IEnumerable<string> files)
    {
        if (OperatingSystem.IsWindows())
            return;
        foreach (var file in files)
        {
            try
            {
                if (File.GetUnixFileMode(file) is var mode && (mode & ~Owner) != 0)
                    File.SetUnixFileMode(file, mode & Owner);
            }
            catch (UnauthorizedAccessException)
            {
                // Somebody else's file that we may write, or a file system without modes: how the operator wants it.
            }
        }
    }
}
