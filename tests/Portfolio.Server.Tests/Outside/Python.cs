using System.Diagnostics;

namespace Portfolio.Server.Tests.Outside;

/// <summary>A Python with NumPy and SciPy, which the programs from outside need.</summary>
internal static class Python
{
    private static readonly Lazy<string?> Found = new(() => new[] { "/usr/bin/python3", "python3" }.FirstOrDefault(HasPackages));

    /// <summary>What a program prints; skips the test where no Python has what it needs.</summary>
    public static async Task<string> Run(IReadOnlyList<string> arguments, string input, CancellationToken stop)
    {
        var python = Found.Value;
        if (python is null)
            Assert.Skip("No python3 with numpy and scipy (Debian: python3-numpy python3-scipy).");
        using var process = Start(python, arguments);
        var output = process.StandardOutput.ReadToEndAsync(stop);
        var errors = process.StandardError.ReadToEndAsync(stop);
        await process.StandardInput.WriteAsync(input);
        process.StandardInput.Close();
        await process.WaitForExitAsync(stop);
        Assert.True(process.ExitCode == 0, await errors);
        return await output;
    }

    private static bool HasPackages(string python)
    {
        try
        {
            using var process = Start(python, ["-c", "import numpy, scipy"]);
            process.StandardInput.Close();
            process.WaitForExit();
            return process.ExitCode == 0;
        }
        catch (System.ComponentModel.Win32Exception)
        {
            return false; // there is no such program
        }
    }

    private static Process Start(string python, IReadOnlyList<string> arguments)
    {
        var start = new ProcessStartInfo(python) { RedirectStandardInput = true, RedirectStandardOutput = true, RedirectStandardError = true };
        foreach (var argument in arguments)
            start.ArgumentList.Add(argument);
        // Two simulations at once; linear algebra with threads of its own would only disturb them.
        start.Environment["OPENBLAS_NUM_THREADS"] = "1";
        start.Environment["PYTHONDONTWRITEBYTECODE"] = "1";
        return Process.Start(start)!;
    }
}
