using BenchmarkDotNet.Running;
using Portfolio.Benchmarks;

#pragma warning disable RS0030 // A program of its own: here the system's clock comes in.
var clock = TimeProvider.System;
#pragma warning restore RS0030
return args switch
{
    ["document", ..] => DocumentBenchmark.Run(args[1..]),
    ["reading", ..] => await ReadingBenchmark.RunAsync(args[1..], clock),
    ["kernels"] => KernelBenchmark.Run(),
    ["kernels", "--bench"] => BenchmarkRunner.Run<RowKernels>().HasCriticalValidationErrors ? 1 : 0,
    ["growth"] => GrowthBenchmark.Run(),
    _ => Usage(),
};

static int Usage()
{
    Console.Error.WriteLine("""
        usage: document FILE [--iterations N] [--threads T] [--json]   simulate a document in process; medians of 3 after a warm-up
               reading FILE [--json]     read, check, compile, store and load a document: the first time in a process, and later
               kernels [--bench]         nanoseconds of the engine's inner loops, and how drawing scales; --bench: by BenchmarkDotNet
               growth                    factors of a run's time when projects, activities or iterations double
        """);
    return 2;
}
