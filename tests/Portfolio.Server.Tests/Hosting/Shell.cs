using System.Diagnostics;

namespace Portfolio.Server.Tests.Hosting;

/// <summary>Commands of the documents, worked by bash as a reader would paste them.</summary>
internal static class Shell
{
    /// <summary>What the script says when it is run in a folder, where it is also kept.</summary>
    public static async Task<string> SaysAsync(DirectoryInfo folder, string script)
    {
        var cancellation = TestContext.Current.CancellationToken;
        var file = Path.Combine(folder.FullName, "commands.sh");
        await File.WriteAllTextAsync(file, script, cancellation);
        using var bash = Process.Start(
            new ProcessStartInfo("/bin/bash", [file]) { RedirectStandardOutput = true, WorkingDirectory = folder.FullName })!;
        var said = await bash.StandardOutput.ReadToEndAsync(cancellation);
        await bash.WaitForExitAsync(cancellation);
        return said;
    }
}
