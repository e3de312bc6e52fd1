using Portfolio.Benchmarks;

#pragma warning disable RS0030 // A program of its own: here the system's clock comes in.
var clock = TimeProvider.System;
#pragma warning restore RS0030
return args switch
{
    ["document", ..] => DocumentBenchmark.Run(args[1..]),
    ["reading", ..] => await ReadingBenchmark.RunAsync(args[1..], clock),
    _ => Usage(),
};

static int Usage()
{
    Console.Error.WriteLine("""
        usage: document FILE [--iterations N] [--threads T] [--json]   simulate a document in process; medians of 3 after a warm-up
        """);
    return 2;
}
