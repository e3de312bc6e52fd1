using System.Diagnostics;
using System.Runtime.InteropServices;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json.Nodes;
using Portfolio.Engine;
using Portfolio.Engine.Runs;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Every draw is a function of seed, key and iteration alone (contract section 4, item 11): the same bits however a run is worked.
/// </summary>
public sealed class RepeatabilityTests
{
    private const int Iterations = 2 * BlockSamples.Size + 1000;
    private const string DigestFile = "PORTFOLIO_DIGEST_FILE";

    private static readonly (int Seed, string? Rule)[] Cases = [(401, null), (402, "passing"), (403, "inOrder"), (404, "passing")];

    [Fact]
    public void ThreadsChangeNoBit()
    {
        var digest = DigestOfCases(threads: 1);
        Assert.Equal(digest, DigestOfCases(threads: 2));
        Assert.Equal(digest, DigestOfCases(threads: 8));
        if (Environment.GetEnvironmentVariable(DigestFile) is { } file)
            File.WriteAllText(file, digest);
    }

    /// <summary>The test above again in a process whose processor lacks instructions: the digest that it leaves must be the same.</summary>
    [Theory]
    [InlineData("DOTNET_EnableAVX512")]
    [InlineData("DOTNET_EnableAVX2")]
    [InlineData("DOTNET_EnableHWIntrinsic")]
    public async Task NarrowerVectorsChangeNoBit(string instructions)
    {
        var file = Path.GetTempFileName();
        try
        {
            var start = new ProcessStartInfo(Environment.ProcessPath!) { RedirectStandardOutput = true };
            if (Path.GetFileNameWithoutExtension(Environment.ProcessPath) == "dotnet")
                start.ArgumentList.Add(typeof(RepeatabilityTests).Assembly.Location);
            start.ArgumentList.Add("--filter-method");
            start.ArgumentList.Add($"{typeof(RepeatabilityTests).FullName}.{nameof(ThreadsChangeNoBit)}");
            (start.Environment[instructions], start.Environment[DigestFile]) = ("0", file);
            using var process = Process.Start(start)!;
            var output = await process.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
            await process.WaitForExitAsync(TestContext.Current.CancellationToken);
            Assert.True(process.ExitCode == 0, output);
            Assert.Equal(DigestOfCases(threads: 2), await File.ReadAllTextAsync(file, TestContext.Current.CancellationToken));
        }
        finally
        {
            File.Delete(file);
        }
    }

    [Fact]
    public void AnySplitIntoBlockRangesGivesTheSameBits()
    {
        var stop = TestContext.Current.CancellationToken;
        foreach (var (seed, rule) in Cases)
        {
            var plan = Documents.Compile(RandomDocument.Json(seed, rule));
            var split = new Samples(plan, Iterations);
            plan.Run(3, BlockSamples.Size, Iterations - BlockSamples.Size, new RunOptions(2), split.Take, stop);
            plan.Run(3, 0, BlockSamples.Size, new RunOptions(1), split.Take, stop);
            Assert.Equal(Digest(plan.Run(3, Iterations)), Digest(split));
        }
    }

    [Fact]
    public void TheFirstIterationsOfALongerRunAreThoseOfTheShorter()
    {
        var plan = Documents.Compile(RandomDocument.Json(402, "passing"));
        var (longer, shorter) = (plan.Run(3, Iterations), plan.Run(3, 777));
        Assert.Equal(shorter.Finish, longer.Finish.Select(row => row[..777]));
        Assert.Equal(shorter.Cost, longer.Cost.Select(row => row[..777]));
        Assert.Equal(shorter.Milestone, longer.Milestone.Select(row => row[..777]));
    }

    [Fact]
    public void PermutingProjectsChangesNoBit()
    {
        for (var seed = 410; seed < 420; seed++)
        {
            var document = RandomDocument.Of(seed, null);
            var before = ByProject(document);
            Shuffle(document["projects"]!.AsArray(), seed);
            var after = ByProject(document);
            foreach (var (project, rows) in before)
            {
                Assert.Equal(rows.Finish, after[project].Finish);
                Assert.Equal(rows.Cost, after[project].Cost);
            }
        }
    }

    /// <summary>
    /// Costs are then added in another sequence, so that a sum just at half a minor unit may be rounded to the other side.
    /// </summary>
    [Fact]
    public void PermutingActivitiesChangesNoDraw()
    {
        for (var seed = 420; seed < 430; seed++)
        {
            var document = RandomDocument.Of(seed, null);
            var before = ByProject(document);
            foreach (var project in document["projects"]!.AsArray())
                Shuffle(project!["activities"]!.AsArray(), seed);
            var after = ByProject(document);
            foreach (var (project, rows) in before)
            {
                Assert.Equal(rows.Finish, after[project].Finish);
                Assert.All(rows.Cost.Zip(after[project].Cost), x => Assert.InRange(x.First - x.Second, -1, 1));
            }
        }
    }

    [Fact]
    public void AProjectMoreThatNoPairNamesChangesNoBitOfTheOthers()
    {
        for (var seed = 430; seed < 440; seed++)
        {
            var document = RandomDocument.Of(seed, null);
            var before = ByProject(document);
            document["projects"]!.AsArray().Insert(0, Another((string)document["settings"]!["drivers"]![0]!["id"]!));
            var after = ByProject(document);
            foreach (var (project, rows) in before)
            {
                Assert.Equal(rows.Finish, after[project].Finish);
                Assert.Equal(rows.Cost, after[project].Cost);
            }
        }
    }

    private static JsonNode Another(string driver) => JsonNode.Parse(
        """
        { "id": "another", "programme": "north", "statusDate": "2026-11-05", "correlation": 0.4, "drivers": ["DRIVER"], "activities": [
            { "id": "A", "duration": { "type": "pert", "low": 3, "mode": 5, "high": 12 },
              "cost": { "fixed": { "type": "uniform", "low": 1, "high": 2 } } },
            { "id": "B", "milestone": true, "predecessors": ["A"] } ] }
        """.Replace("DRIVER", driver, StringComparison.Ordinal))!;

    private static Dictionary<string, (int[] Finish, double[] Cost)> ByProject(JsonObject document)
    {
        var plan = Documents.Compile(Encoding.UTF8.GetBytes(document.ToJsonString()));
        var samples = plan.Run(3, 3000);
        return plan.Document.Projects.Index().ToDictionary(p => p.Item.Id, p => (samples.Finish[p.Index], samples.Cost[p.Index]));
    }

    private static void Shuffle(JsonArray items, int seed)
    {
        var shuffled = items.Select(item => item!.DeepClone()).ToArray();
        new Dice(seed).Shuffle(shuffled);
        items.Clear();
        foreach (var item in shuffled)
            items.Add(item);
    }

    private static string DigestOfCases(int threads) =>
        string.Join(' ', Cases.Select(c => Digest(Documents.Compile(RandomDocument.Json(c.Seed, c.Rule)).Run(3, Iterations, threads))));

    private static string Digest(Samples samples)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var row in samples.Finish.Concat(samples.Milestone))
            hash.AppendData(MemoryMarshal.AsBytes<int>(row));
        foreach (var row in samples.Cost)
            hash.AppendData(MemoryMarshal.AsBytes<double>(row));
        return Convert.ToHexString(hash.GetHashAndReset());
    }
}
