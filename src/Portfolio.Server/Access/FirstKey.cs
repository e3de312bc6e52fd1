using Portfolio.Store.Access;

namespace Portfolio.Server.Access;

/// <summary>The key of the first administrator, left in a file that only the server's user can read.</summary>
internal static class FirstKey
{
    /// <summary>Makes a key, writes it to the file and returns it.</summary>
    public static string Write(string path)
    {
        var key = KeySecret.New(KeySecret.NewId());
        MakeFolder(Path.GetDirectoryName(path)!);
        File.Delete(path);
        var options = new FileStreamOptions { Mode = FileMode.CreateNew, Access = FileAccess.Write };
        if (!OperatingSystem.IsWindows())
            options.UnixCreateMode = UnixFileMode.UserRead | UnixFileMode.UserWrite;
        using var stream = new FileStream(path, options);
        using var writer = new StreamWriter(stream);
        writer.WriteLine(key);
        writer.Flush();
        stream.Flush(flushToDisk: true);
        return key;
    }

    private static void MakeFolder(string directory)
    {
        if (OperatingSystem.IsWindows())
            Directory.CreateDirectory(directory);
        else
            Directory.CreateDirectory(directory, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute);
    }
}
