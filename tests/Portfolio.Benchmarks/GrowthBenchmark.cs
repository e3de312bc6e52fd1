using System.Globalization;
using Portfolio.Engine;
using Portfolio.Engine.Runs;

namespace Portfolio.Benchmarks;

/// <summary>Twice the projects, activities or iterations: how many times as long a run takes. Close to 2 is as it should be.</summary>
internal static class GrowthBenchmark
{
    // Two blocks of iterations, so that their double is four whole ones.
    private const int Projects = 40, Activities = 250, Iterations = 2 * BlockSamples.Size;

    public static int Run()
    {
        var plan = Compiled(Projects, Activities);
        Compare("projects", Projects, plan, Iterations, Compiled(2 * Projects, Activities), Iterations);
        Compare("activities", Activities, plan, Iterations, Compiled(Projects, 2 * Activities), Iterations);
        Compare("iterations", Iterations, plan, Iterations, plan, 2 * Iterations);
        return 0;
    }

    private static Plan Compiled(int projects, int activities) => Plan.Compile(InventedPortfolio.Of(projects, activities));

    // One thread: two would add what else runs on the machine. By turns, and ratios of pairs: its speed changes from minute to minute.
    private static void Compare(string what, int from, Plan one, int iterations, Plan two, int more)
    {
        var (ones, twos) = DocumentBenchmark.InTurn(
            () => DocumentBenchmark.Simulate(one, iterations, threads: 1), () => DocumentBenchmark.Simulate(two, more, threads: 1));
        var clock = DocumentBenchmark.Median(ones.Zip(twos, (a, b) => b.Seconds / a.Seconds));
        var cpu = DocumentBenchmark.Median(ones.Zip(twos, (a, b) => b.Cpu / a.Cpu));
        var (before, after) = (DocumentBenchmark.Median(ones.Select(r => r.Seconds)), DocumentBenchmark.Median(twos.Select(r => r.Seconds)));
        Console.WriteLine(string.Create(
            CultureInfo.InvariantCulture,
            $"{what,-10} {from,5} → {2 * from,5}: {before:0.000} → {after:0.000} s, {clock:0.00} times ({cpu:0.00} in processor time)"));
    }
}
