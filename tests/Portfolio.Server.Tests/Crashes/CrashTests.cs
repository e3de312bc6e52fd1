using System.Diagnostics;
using System.Net;
using System.Text.Json;
using Microsoft.Extensions.Time.Testing;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;
using Portfolio.Store.Sqlite;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Tests.Crashes;

/// <summary>The server is killed and its disk filled while others write. How many kills: <c>PORTFOLIO_KILLS</c>.</summary>
public sealed class CrashTests : IDisposable
{
    private static readonly int Kills = int.TryParse(Environment.GetEnvironmentVariable("PORTFOLIO_KILLS"), out var given) ? given
        : Environment.GetEnvironmentVariable("PORTFOLIO_LONG") == "1" ? 50 : 20;

    private readonly string directory = Directory.CreateTempSubdirectory("portfolio-").FullName;

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public void Dispose() => Directory.Delete(directory, recursive: true);

    [Fact]
    public async Task WhatWasAnsweredIsKeptOnceHoweverOftenTheServerIsKilled()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals of Unix are sent.");
        var moments = new Random(20270104);
        Writer[] writers = [new("lock"), new("quay"), new("weir")];
        for (var kill = 0; kill < Kills; kill++)
        {
            using var server = await ServerProcess.StartAsync(directory, ("Roles", "api"), ("Limits__QueuedRuns", "10000"));
            var writing = writers.Select(writer => writer.WriteAsync(server.Client)).ToList();
            await UntilWrittenAsync(writers, moments.Next(1, 40));
            await Task.Delay(moments.Next(0, 20), Cancellation);
            await server.KillAsync();
            await Task.WhenAll(writing);
        }
        using (var last = await ServerProcess.StartAsync(directory, ("Roles", "api")))
        {
            foreach (var writer in writers)
                await CheckAsync(last.Client, writer);
            await last.StopAsync();
        }
        Assert.True(writers.Sum(writer => writer.Acknowledged.Count) > Kills, "Too little was written to prove anything.");
        await AuditIsWholeAsync();
    }

    // On a busy machine the same time is sometimes one write and sometimes a hundred.
    private static async Task UntilWrittenAsync(Writer[] writers, int more)
    {
        var (before, waited) = (writers.Sum(writer => writer.Acknowledged.Count), Stopwatch.StartNew());
        while (writers.Sum(writer => writer.Acknowledged.Count) < before + more && waited.Elapsed < TimeSpan.FromMinutes(1))
            await Task.Delay(1, Cancellation);
    }

    private static async Task CheckAsync(HttpClient client, Writer writer)
    {
        var revisions = await ListAsync(client, $"/v1/portfolios/{writer.Portfolio}/revisions?limit=1000");
        revisions.Reverse();
        Assert.Equal(Enumerable.Range(1, revisions.Count).Select(number => (long)number), revisions.Select(each => each.GetProperty("revision").GetInt64()));
        // One effect of each write, in the order in which they were sent; the last may have been kept without an answer.
        Assert.Equal(Enumerable.Range(1, revisions.Count).Select(number => $"{number}"), revisions.Select(each => each.GetProperty("note").GetString()));
        Assert.InRange(revisions.Count - writer.Acknowledged.Count, 0, 1);
        Assert.All(writer.Acknowledged, write => Assert.Equal(write.Key, write.Value));

        var runs = (await ListAsync(client, $"/v1/portfolios/{writer.Portfolio}/runs?limit=1000")).Select(run => run.GetProperty("id").GetString()!).ToHashSet();
        Assert.Superset(writer.Runs.Values.ToHashSet(), runs);
        Assert.InRange(runs.Count - writer.Runs.Count, 0, 1);
    }

    private static async Task<List<JsonElement>> ListAsync(HttpClient client, string address)
    {
        var items = new List<JsonElement>();
        for (string? next = ""; next is not null;)
        {
            var page = await (await client.ReadAsync(address + next)).JsonAsync();
            items.AddRange(page.GetProperty("items").EnumerateArray());
            next = page.TryGetProperty("next", out var cursor) ? $"&cursor={cursor}" : null;
        }
        return items;
    }

    private async Task AuditIsWholeAsync()
    {
        await using var database = await SqliteDatabase.OpenAsync(directory, new FakeTimeProvider(), Cancellation);
        var verified = await new AuditStore(database).VerifyAsync(Cancellation);
        Assert.True(verified.FirstBroken is null, verified.ToString());
    }

    [Fact]
    public async Task AFullDiskIsSaidKeepsNothingHalfAndEnds()
    {
        Assert.SkipUnless(File.Exists("/usr/bin/prlimit"), "The size of files is limited by prlimit.");
        using var server = await ServerProcess.StartAsync(directory, ("Roles", "api"));
        const string address = "/v1/portfolios/full/document";
        Assert.Equal(HttpStatusCode.Created, (await server.Client.PutJsonAsync(address, Samples.Document(days: 1))).StatusCode);
        await LimitFilesAsync(server, "4096");
        for (var days = 2; days < 5; days++)
        {
            // Large enough that no space left in the files takes it.
            var refused = await server.Client.PutJsonAsync(address, Samples.Document(Noise(200), days), "*");
            await refused.ProblemAsync(503, "storage-unavailable");
            Assert.NotNull(refused.Headers.RetryAfter);
        }
        Assert.Equal(Samples.Document(days: 1), await (await server.Client.ReadAsync(address)).TextAsync());
        Assert.Equal(HttpStatusCode.ServiceUnavailable, (await server.Client.ReadAsync("/health/ready")).StatusCode);

        await LimitFilesAsync(server, "unlimited");
        var kept = await server.Client.PutJsonAsync(address, Samples.Document(days: 5), "*");
        Assert.Equal("""{"portfolio":"full","revision":2,"changed":true}""", await kept.TextAsync());
        Assert.Equal(HttpStatusCode.OK, (await server.Client.ReadAsync("/health/ready")).StatusCode);
        await server.StopAsync();
        await AuditIsWholeAsync();
    }

    private static string Noise(int length) => string.Concat(Enumerable.Range(0, length).Select(i => (char)('a' + (i * 7919 % 26))));

    private static async Task LimitFilesAsync(ServerProcess server, string bytes)
    {
        using var limit = Process.Start("prlimit", ["--pid", $"{server.Id}", $"--fsize={bytes}:unlimited"]);
        await limit.WaitForExitAsync(Cancellation);
        Assert.Equal(0, limit.ExitCode);
    }
}
