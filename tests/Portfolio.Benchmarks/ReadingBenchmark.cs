using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using Portfolio.Engine;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Documents;
using Portfolio.Store;
using Portfolio.Store.Sqlite;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Benchmarks;

/// <summary>
/// What a document costs before anything is simulated: read, checked, compiled; stored and read back. The first round is that of a
/// process just started, whose code is not compiled yet; then the median of three.
/// </summary>
internal static class ReadingBenchmark
{
    private const int Rounds = 4;

    public static async Task<int> RunAsync(string[] args, TimeProvider clock)
    {
        var json = await File.ReadAllBytesAsync(args[0]);
        var folder = Directory.CreateTempSubdirectory("portfolio-reading-").FullName;
        var rounds = new List<Dictionary<string, Spent>>();
        await using (var database = await SqliteDatabase.OpenAsync(folder, clock, CancellationToken.None))
        {
            for (var round = 0; round < Rounds; round++)
                rounds.Add(await RoundAsync(json, new DocumentStore(database), $"round{round}", round));
        }
        Directory.Delete(folder, recursive: true);
        Print(rounds, args.Contains("--json"));
        return 0;
    }

    private static async Task<Dictionary<string, Spent>> RoundAsync(byte[] json, DocumentStore documents, string portfolio, int round)
    {
        var spent = new Dictionary<string, Spent>();
        var check = new DocumentCheck(ModelLimits.Default);
        // Contents are kept once by hash: a name of its own makes every round store everything anew.
        var document = Timed(spent, "read", () => DocumentReader.OfStored.ReadDocument(json));
        var valid = Timed(spent, "check", () =>
            check.Check(document, json, out var faults) ?? throw new InvalidDataException(faults[0].Message));
        var projects = document.Projects!.Select(p => p with { Name = $"{p.Name} {round}" }).ToArray();
        var parts = Timed(spent, "parts", () => (ProposedPart[])
        [
            new ProposedPart(PartNames.Settings, DocumentReader.Bytes(document.Settings!)),
            .. SideBySide.Each(projects, (p, _) => new ProposedPart(p.Id!, DocumentReader.Bytes(p))),
        ]);
        Timed(spent, "compile", () => Plan.Compile(valid));
        var write = new DocumentWrite { Portfolio = portfolio, Action = "document.put" };
        await TimedAsync(spent, "store", () => documents.WriteAsync(
            Caller.System, write, (head, _) => Task.FromResult<Proposal>(Change.Everything(head, parts)), CancellationToken.None));
        var stored = await TimedAsync(spent, "load", () => documents.ReadAsync(Caller.System, portfolio, null, CancellationToken.None));
        Timed(spent, "open", () => ValidPortfolio.Check(
            DocumentReader.FromParts(stored!.Parts[0].Bytes, [.. stored.Parts.Skip(1).Select(p => (ReadOnlyMemory<byte>)p.Bytes)]), out _));
        return spent;
    }

    private static T Timed<T>(Dictionary<string, Spent> spent, string stage, Func<T> work)
    {
        var watch = Watch.Start();
        var value = work();
        spent[stage] = watch.Spent;
        return value;
    }

    private static async Task<T> TimedAsync<T>(Dictionary<string, Spent> spent, string stage, Func<Task<T>> work)
    {
        var watch = Watch.Start();
        var value = await work();
        spent[stage] = watch.Spent;
        return value;
    }

    private static void Print(List<Dictionary<string, Spent>> rounds, bool json)
    {
        var first = rounds[0];
        var later = first.Keys.ToDictionary(stage => stage, stage => Median(rounds.Skip(1).Select(r => r[stage])));
        var peak = Process.GetCurrentProcess().PeakWorkingSet64 / (1024.0 * 1024);
        if (json)
        {
            Console.WriteLine(JsonSerializer.Serialize(new { first, later, peakMebibytes = peak }, JsonSerializerOptions.Web));
            return;
        }
        Console.WriteLine("stage      first: seconds   CPU   pauses     later: seconds   CPU   pauses");
        foreach (var stage in first.Keys)
            Line(stage, first[stage], later[stage]);
        Line("all", Sum(first.Values), Sum(later.Values));
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"peak memory {peak:0} MiB"));
    }

    private static void Line(string stage, Spent first, Spent later) => Console.WriteLine($"{stage,-10}       {first}          {later}");

    private static Spent Sum(IEnumerable<Spent> all) =>
        all.Aggregate((a, b) => new Spent(a.Seconds + b.Seconds, a.Cpu + b.Cpu, a.Pause + b.Pause));

    private static Spent Median(IEnumerable<Spent> all)
    {
        var list = all.ToArray();
        return new Spent(Middle(spent => spent.Seconds), Middle(spent => spent.Cpu), Middle(spent => spent.Pause));

        double Middle(Func<Spent, double> of) => list.Select(of).Order().ElementAt(list.Length / 2);
    }

    /// <summary>Seconds on the clock and of all threads of the process; on a shared machine the second says more. And how long the
    /// collector stopped them all.</summary>
    private sealed record Spent(double Seconds, double Cpu, double Pause)
    {
        public override string ToString() => string.Create(CultureInfo.InvariantCulture, $"{Seconds,7:0.000} {Cpu,7:0.000} {Pause,7:0.000}");
    }

    private sealed class Watch
    {
        private readonly Stopwatch clock = Stopwatch.StartNew();
        private readonly TimeSpan cpu = Process.GetCurrentProcess().TotalProcessorTime;
        private readonly TimeSpan pause = GC.GetTotalPauseDuration();

        public static Watch Start() => new();

        public Spent Spent => new(clock.Elapsed.TotalSeconds, (Process.GetCurrentProcess().TotalProcessorTime - cpu).TotalSeconds,
            (GC.GetTotalPauseDuration() - pause).TotalSeconds);
    }
}
