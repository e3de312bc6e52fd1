using BenchmarkDotNet.Attributes;
using BenchmarkDotNet.Configs;
using BenchmarkDotNet.Jobs;
using BenchmarkDotNet.Toolchains.InProcess.Emit;
using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;

namespace Portfolio.Benchmarks;

/// <summary>
/// Draws and quantiles once more, measured by BenchmarkDotNet: slower, with its statistics. In this process, because what it measures is
/// internal to the engine.
/// </summary>
[Config(typeof(InProcess))]
public class RowKernels
{
    private const int Chunk = 1024, Key = 0x5EED;

    private readonly double[] row = new double[Chunk];
    private readonly double[] scores = new double[Chunk];
    private Marginal[] marginals = [];

    public static IEnumerable<int> Kinds => Enumerable.Range(0, KernelBenchmark.Marginals.Length);

    [GlobalSetup]
    public void Draw()
    {
        NormalScore.Fill(1, Key, 0, scores);
        marginals = [.. KernelBenchmark.Marginals.Select(m => Marginal.Of(m.Stated))];
    }

    [Benchmark(OperationsPerInvoke = Chunk)]
    public void UniformDraw() => Uniforms.Fill(1, Key, 0, row);

    [Benchmark(OperationsPerInvoke = Chunk)]
    public void ScoreDraw() => NormalScore.Fill(1, Key, 0, row);

    [Benchmark(OperationsPerInvoke = Chunk)]
    [ArgumentsSource(nameof(Kinds))]
    public void Quantile(int kind) => marginals[kind].Read(scores, row);

    private sealed class InProcess : ManualConfig
    {
        public InProcess() => AddJob(Job.ShortRun.WithToolchain(InProcessEmitToolchain.Instance));
    }
}
