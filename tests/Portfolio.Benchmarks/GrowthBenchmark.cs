using System.Globalization;
using Portfolio.Engine;

namespace Portfolio.Benchmarks;

/// <summary>Twice the projects, activities or iterations: how many times as long a run takes. Close to 2 is as it should be.</summary>
internal static class GrowthBenchmark
{
    private const int Projects = 40, Activities = 250, Iterations = 5_120;

    public static int Run()
    {
        var one = Seconds(Projects, Activities, Iterations);
        Line("projects", Projects, one, Seconds(2 * Projects, Activities, Iterations));
        Line("activities", Activities, one, Seconds(Projects, 2 * Activities, Iterations));
        Line("iterations", Iterations, one, Seconds(Projects, Activities, 2 * Iterations));
        return 0;
    }

    // One thread: two would add what else runs on the machine.
    private static double Seconds(int projects, int activities, int iterations)
    {
        var plan = Plan.Compile(InventedPortfolio.Of(projects, activities));
        DocumentBenchmark.Simulate(plan, iterations, threads: 1);
        return Timing.Median(() => Timing.Cpu(() => DocumentBenchmark.Simulate(plan, iterations, threads: 1)));
    }

    private static void Line(string what, int from, double one, double two) => Console.WriteLine(string.Create(
        CultureInfo.InvariantCulture,
        $"{what,-10} {from,5} → {2 * from,5}: {one:0.000} → {two:0.000} s of processor time, {two / one:0.00} times"));
}
