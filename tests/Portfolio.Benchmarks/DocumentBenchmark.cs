using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using Portfolio.Engine;
using Portfolio.Engine.Draws;
using Portfolio.Engine.Runs;
using Portfolio.Model.Documents;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Benchmarks;

/// <summary>
/// Reads, checks, compiles and simulates one document in process, beside the time of drawing the same number of scores and nothing else.
/// </summary>
internal static class DocumentBenchmark
{
    private const int Repeats = 5;

    public static int Run(string[] args)
    {
        var iterations = Option(args, "--iterations", 10_000);
        var threads = Option(args, "--threads", Environment.ProcessorCount);
        var json = File.ReadAllBytes(args[0]);
        var (portfolio, readSeconds) = Timed(() => Read(json));
        var (plan, compileSeconds) = Timed(() => Plan.Compile(portfolio));
        var activities = portfolio.Document.Projects.Sum(p => p.Activities.Count);
        var draws = DrawsPerIteration(portfolio.Document);
        var (runs, drawings) = InTurn(() => Simulate(plan, iterations, threads), () => Draw(draws, iterations, threads));
        var peak = Process.GetCurrentProcess().PeakWorkingSet64;
        var (single, singleDrawings) = threads == 1
            ? (runs, drawings)
            : InTurn(() => Simulate(plan, iterations, 1), () => Draw(draws, iterations, 1));
        var seconds = Median(runs.Select(r => r.Seconds));
        var figures = new Figures(
            activities, iterations, threads, seconds, activities * (double)iterations / seconds, readSeconds, compileSeconds,
            peak / (1024.0 * 1024), draws, Median(drawings.Select(d => d.Seconds)),
            Median(runs.Zip(drawings, (r, d) => r.Seconds / d.Seconds)), Median(runs.Select(r => r.Cpu)),
            Median(runs.Zip(drawings, (r, d) => r.Cpu / d.Cpu)),
            Median(single.Zip(runs, (one, all) => one.Seconds / all.Seconds)),
            Median(singleDrawings.Zip(drawings, (one, all) => one.Seconds / all.Seconds)));
        Print(figures, args.Contains("--json"));
        return 0;
    }

    internal static ValidPortfolio Read(byte[] json)
    {
        var document = DocumentReader.OfStored.ReadDocument(json);
        var parts = (document.Projects ?? []).Select(p => (ReadOnlyMemory<byte>)DocumentReader.Bytes(p)).ToArray();
        var model = DocumentReader.FromParts(DocumentReader.Bytes(document.Settings!), parts);
        return ValidPortfolio.Check(model, out var faults) ?? throw new InvalidDataException(faults[0].Message);
    }

    internal static void Simulate(Plan plan, int iterations, int threads) =>
        plan.Run(plan.Document.Settings.Seed, 0, iterations, new RunOptions(threads), _ => { });

    // The same number of normal scores as the run draws, nothing else.
    internal static void Draw(int draws, int iterations, int threads)
    {
        const int chunk = 256;
        Parallel(threads, t =>
        {
            var scores = new double[chunk];
            for (var from = t * chunk; from < iterations; from += threads * chunk)
            {
                for (var d = 0; d < draws; d++)
                    NormalScore.Fill(1, (ulong)d * 0x9E3779B97F4A7C15, from, scores.AsSpan(0, Math.Min(chunk, iterations - from)));
            }
        });
    }

    // On threads like those of a run, so that both get the same share of a busy machine.
    internal static void Parallel(int threads, Action<int> work)
    {
        var next = -1;
        EngineThreads.Work(threads, _ => work(Interlocked.Increment(ref next)), CancellationToken.None);
    }

    // Two pieces of work by turns after a warm-up, so that what is compared was measured while the machine was the same.
    internal static ((double Seconds, double Cpu)[] First, (double Seconds, double Cpu)[] Second) InTurn(Action first, Action second)
    {
        first();
        second();
        var both = Enumerable.Range(0, Repeats).Select(_ => (First: Measured(first), Second: Measured(second))).ToArray();
        return ([.. both.Select(x => x.First)], [.. both.Select(x => x.Second)]);
    }

    private static (double Seconds, double Cpu) Measured(Action work)
    {
        var before = Process.GetCurrentProcess().TotalProcessorTime;
        var (_, seconds) = Timed(() => { work(); return 0; });
        return (seconds, (Process.GetCurrentProcess().TotalProcessorTime - before).TotalSeconds);
    }

    internal static double Median(IEnumerable<double> measured) => measured.Order().ElementAt(Repeats / 2);

    private static (T Value, double Seconds) Timed<T>(Func<T> work)
    {
        var watch = Stopwatch.StartNew();
        var value = work();
        return (value, watch.Elapsed.TotalSeconds);
    }

    private static int DrawsPerIteration(PortfolioDocument document)
    {
        static int Drawn(params Model.Distributions.Distribution?[] stated) => stated.Count(d => d is not null and not Model.Distributions.Constant);
        var activities = document.Projects.SelectMany(p => p.Activities).Where(a => !a.Finished);
        return activities.Sum(a => Drawn(a.UnderWay ? a.Remaining : a.Duration, a.Cost?.Fixed, a.Cost?.PerDay))
            + document.Projects.Count + document.Settings.Drivers.Count
            + document.Projects.SelectMany(p => p.RiskEvents).Concat(document.Settings.RiskEvents).Sum(e => 1 + e.Impacts.Count);
    }

    private static int Option(string[] args, string name, int otherwise)
    {
        var at = Array.IndexOf(args, name);
        return at < 0 ? otherwise : int.Parse(args[at + 1], CultureInfo.InvariantCulture);
    }

    private static void Print(Figures f, bool json)
    {
        Console.WriteLine(json ? JsonSerializer.Serialize(f, JsonSerializerOptions.Web) : string.Create(CultureInfo.InvariantCulture, $"""
            activities {f.Activities}, iterations {f.Iterations}, threads {f.Threads}
            seconds {f.Seconds:0.000} (median of {Repeats}), {f.ActivitySamplesPerSecond / 1e6:0.0} million activity samples per second
            read and check {f.ReadSeconds:0.000} s, compile {f.CompileSeconds:0.000} s, peak memory {f.PeakMebibytes:0} MiB
            drawing alone ({f.ScoresPerIteration} scores per iteration) {f.DrawingSeconds:0.000} s: the run takes {f.TimesDrawing:0.00} times as long
            processor time {f.CpuSeconds:0.000} s, {f.TimesDrawingCpu:0.00} times that of drawing
            one thread {f.Scaling * f.Seconds:0.000} s: {f.Threads} scale {f.Scaling:0.00} times, drawing alone {f.DrawingScaling:0.00} times
            """));
    }

    private sealed record Figures(
        int Activities, int Iterations, int Threads, double Seconds, double ActivitySamplesPerSecond, double ReadSeconds, double CompileSeconds,
        double PeakMebibytes, int ScoresPerIteration, double DrawingSeconds, double TimesDrawing,
        double CpuSeconds, double TimesDrawingCpu, double Scaling, double DrawingScaling);
}
