using System.Text.RegularExpressions;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;

namespace Portfolio.Server.Tests;

/// <summary>The examples of docs/api.md, block by block in one shell, as a reader would paste them; each says what the guide shows.</summary>
public sealed partial class ApiGuideTests : IDisposable
{
    private const string Needs = "The examples need bash, curl and openssl.";

    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("portfolio-");

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [GeneratedRegex("^```sh\\n(?<commands>.*?)^```\\n(?:\\n```json\\n(?<shown>.*?)^```\\n)?", RegexOptions.Multiline | RegexOptions.Singleline)]
    private static partial Regex Blocks();

    [Fact]
    public async Task EveryExampleSaysWhatIsShown()
    {
        Assert.SkipUnless(File.Exists("/bin/bash") && File.Exists("/usr/bin/curl") && File.Exists("/usr/bin/openssl"), Needs);
        var guide = await File.ReadAllTextAsync(Path.Combine(Repository.Root, "docs", "api.md"), Cancellation);
        var blocks = Blocks().Matches(guide);
        Assert.Equal(Regex.Count(guide, "^```sh$", RegexOptions.Multiline), blocks.Count);
        var data = folder.CreateSubdirectory("data");
        using var server = await ServerProcess.StartAsync(data.FullName);
        await File.WriteAllTextAsync(Path.Combine(data.FullName, "first-key.txt"), PortfolioServer.AdminKey, Cancellation);
        var script = "curl() { command curl -s \"$@\"; echo; }\n"
            + string.Concat(blocks.Select((block, i) => $"echo '=== {i}'\n{block.Groups["commands"].Value}"));
        var said = await Shell.SaysAsync(
            folder, script.Replace("http://127.0.0.1:5080", server.Client.BaseAddress!.ToString().TrimEnd('/'), StringComparison.Ordinal));
        var answers = Regex.Split(said, "^=== \\d+\\n", RegexOptions.Multiline).Skip(1).ToList();
        Assert.Equal(blocks.Count, answers.Count);
        foreach (var (block, answer) in blocks.Zip(answers))
            foreach (var line in block.Groups["shown"].Value.Split('\n', StringSplitOptions.RemoveEmptyEntries))
                Assert.True(answer.Contains(line, StringComparison.Ordinal), $"Not found: {line}\nin: {answer}");
    }

    public void Dispose() => folder.Delete(recursive: true);
}
