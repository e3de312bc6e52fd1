using System.Globalization;
using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Benchmarks;

/// <summary>What the engine's inner loops take, one thread, rows of as many iterations as a chunk has.</summary>
internal static class KernelBenchmark
{
    private const int Chunk = 1024, Key = 0x5EED;

    internal static readonly (string Name, Distribution Stated)[] Marginals =
    [
        ("uniform", new Uniform(2, 9)),
        ("triangular", new Triangular(2, 5, 14)),
        ("PERT", new Pert(2, 5, 14)),
        ("PERT, weight without a family", new Pert(2, 5, 14, 7.3)),
        ("normal", new Normal(10, 3)),
        ("normal, truncated", new Normal(10, 5, 0)),
        ("lognormal", new LognormalByMoments(100, 30)),
        ("discrete, 5 outcomes", new Discrete([.. Enumerable.Range(0, 5).Select(i => new Outcome(i, 0.2))])),
        ("percentiles, 5 points", new Percentiles([new(0, 80), new(10, 90), new(50, 100), new(90, 130), new(100, 160)])),
    ];

    public static int Run()
    {
        var row = new double[Chunk];
        var scores = new double[Chunk];
        NormalScore.Fill(1, Key, 0, scores);
        Line("uniform draw", Timing.Nanoseconds(Chunk, () => Uniforms.Fill(1, Key, 0, row)));
        Line("normal score, drawn", Timing.Nanoseconds(Chunk, () => NormalScore.Fill(1, Key, 0, row)));
        foreach (var (name, stated) in Marginals)
        {
            var marginal = Marginal.Of(stated);
            Line($"quantile at a score: {name}", Timing.Nanoseconds(Chunk, () => marginal.Read(scores, row)));
        }
        foreach (var percentile in new[] { 10, 12.3 })
        {
            var stated = new Pert(10, 12, 20, 4, percentile, 90);
            Line(FormattableString.Invariant($"outer limits of a PERT stated at {percentile} and 90 %"), Timing.Nanoseconds(1, () => OuterLimits.Of(stated)));
        }
        ScheduleKernels.Print(Line);
        var scaling = Timing.Scaling(() =>
        {
            Span<double> own = stackalloc double[Chunk];
            for (var key = 0u; key < 2000; key++)
                NormalScore.Fill(1, key, 0, own);
        });
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"drawing on two threads: {scaling:0.00} times as much as on one"));
        return 0;
    }

    private static void Line(string what, double nanoseconds) =>
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{what,-50} {nanoseconds,9:0.00} ns"));
}
