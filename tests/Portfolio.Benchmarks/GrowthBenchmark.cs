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
        var one = Seconds(Projects, Activities, Iterations);
        Line("projects", Projects, one, Seconds(2 * Projects, Activities, Iterations));
        Line("activities", Activities, one, Seconds(Projects, 2 * Activities, Iterations));
        Line("iterations", Iterations, one, Seconds(Projects, Activities, 2 * Iterations));
        return 0;
    }

    // One thread: two would add what else runs on the machine.
    private static (double Clock, double Cpu) Seconds(int projects, int activities, int iterations)
    {
        var plan = Plan.Compile(InventedPortfolio.Of(projects, activities));
        return DocumentBenchmark.Median(() => DocumentBenchmark.Simulate(plan, iterations, threads: 1));
    }

    private static void Line(string what, int from, (double Clock, double Cpu) one, (double Clock, double Cpu) two) => Console.WriteLine(string.Create(
        CultureInfo.InvariantCulture,
        $"{what,-10} {from,5} → {2 * from,5}: {one.Clock:0.000} → {two.Clock:0.000} s by the clock, {two.Clock / one.Clock:0.00} times ({two.Cpu / one.Cpu:0.00} in processor time)"));
}
