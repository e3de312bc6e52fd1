using System.Diagnostics;
using Portfolio.Engine.Runs;

namespace Portfolio.Benchmarks;

/// <summary>
/// How long a piece of work takes: medians of seven after a warm-up, in processor time, which says more than the clock on a machine that is
/// not alone. Each of the seven lasts long enough for the clock's grain.
/// </summary>
internal static class Timing
{
    private const int Repeats = 7;
    private const double Least = 0.05;

    /// <summary>Nanoseconds for each of the operations that one call works.</summary>
    public static double Nanoseconds(long operations, Action work)
    {
        work();
        var calls = 1;
        while (Cpu(() => Again(work, calls)) is < Least)
            calls *= 2;
        return Median(() => Cpu(() => Again(work, calls))) / calls / operations * 1e9;
    }

    /// <summary>
    /// How many times as much the machine works in the same time on two threads as on one, by the clock: 2 when it gives both a processor
    /// of their own.
    /// </summary>
    public static double Scaling(Action work)
    {
        double One(int threads) => Clock(() => EngineThreads.Work(threads, _ => Again(work, 20), CancellationToken.None));
        One(2);
        var ratios = Enumerable.Range(0, Repeats).Select(_ => 2 * One(1) / One(2));
        return ratios.Order().ElementAt(Repeats / 2);
    }

    public static double Median(Func<double> measure) => Enumerable.Range(0, Repeats).Select(_ => measure()).Order().ElementAt(Repeats / 2);

    public static double Cpu(Action work)
    {
        var process = Process.GetCurrentProcess();
        var before = process.TotalProcessorTime;
        work();
        process.Refresh();
        return (process.TotalProcessorTime - before).TotalSeconds;
    }

    private static double Clock(Action work)
    {
        var watch = Stopwatch.StartNew();
        work();
        return watch.Elapsed.TotalSeconds;
    }

    private static void Again(Action work, int calls)
    {
        for (var call = 0; call < calls; call++)
            work();
    }
}
