using System.Diagnostics;
using System.Text.Json;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;

namespace Portfolio.Server.Tests;

/// <summary>The first walk of README.md, command by command as a reader would paste it, against a server that has just started.</summary>
public sealed class ReadmeTests : IDisposable
{
    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("portfolio-");

    [Fact]
    public async Task TheFirstWalkRunsAsWritten()
    {
        Assert.SkipUnless(File.Exists("/bin/bash") && File.Exists("/usr/bin/curl"), "The walk needs bash and curl.");
        var data = folder.CreateSubdirectory("data");
        using var server = await ServerProcess.StartAsync(data.FullName);
        // The test's key was given to the server; a first start without one writes this file itself.
        await File.WriteAllTextAsync(Path.Combine(data.FullName, "first-key.txt"), PortfolioServer.AdminKey, Cancellation);
        var script = Walk().Replace("http://127.0.0.1:5080", server.Client.BaseAddress!.ToString().TrimEnd('/'), StringComparison.Ordinal);
        var said = await Shell.SaysAsync(folder, script);

        Assert.Contains("""{"portfolio":"first","revision":1,"changed":true}""", said, StringComparison.Ordinal);
        Assert.Contains("event: ended", said, StringComparison.Ordinal);
        Assert.Contains("\"state\":\"succeeded\"", said, StringComparison.Ordinal);
        Assert.Contains("\"scope\":\"milestone/lock-gate/OPEN\"", said, StringComparison.Ordinal);
        Assert.Contains("\"allocations\":[{\"project\":\"lock-gate\"", said, StringComparison.Ordinal);
        Assert.Contains("\"metric\":\"finish\",\"level\":80", said, StringComparison.Ordinal);
        Assert.Contains("\"path\":\"/projects/quay/activities/B/duration\"", said, StringComparison.Ordinal);
        Assert.Contains("\"nextDue\"", said, StringComparison.Ordinal);
        // The one refusal is the wrong document, whose two faults are named.
        var refusal = Assert.Single(said.Split('\n'), line => line.Contains("\"/problems/", StringComparison.Ordinal));
        Assert.Equal(
            [("/projects/0/statusDate", "date.format"), ("/projects/0/activities/0/duration", "distribution.order")],
            JsonDocument.Parse(refusal).RootElement.Faults());
    }

    [Fact]
    public async Task TheDataFolderIsMadeWhereTheCommandIsTyped()
    {
        var project = Path.Combine(Repository.Root, "src", "Portfolio.Server", "Portfolio.Server.csproj");
        using var build = Process.Start(
            new ProcessStartInfo("dotnet", ["msbuild", project, "-getProperty:RunWorkingDirectory"])
            {
                RedirectStandardOutput = true,
                WorkingDirectory = folder.FullName,
            })!;
        Assert.Equal(folder.FullName, (await build.StandardOutput.ReadToEndAsync(Cancellation)).Trim());
    }

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    /// <summary>The indented blocks of the section, without their indentation; an empty line is said after each command's answer.</summary>
    private static string Walk()
    {
        var lines = File.ReadAllLines(Path.Combine(Repository.Root, "README.md"));
        var section = lines.SkipWhile(line => line != "## A first walk through the API").Skip(1)
            .TakeWhile(line => !line.StartsWith("## ", StringComparison.Ordinal));
        var commands = section.Where(line => line.StartsWith("    ", StringComparison.Ordinal)).Select(line => line[4..]);
        return "curl() { command curl -s \"$@\"; case \"$*\" in *location*) ;; *) echo ;; esac; }\n" + string.Join('\n', commands);
    }

    public void Dispose() => folder.Delete(recursive: true);
}
