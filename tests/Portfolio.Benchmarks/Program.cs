using Portfolio.Benchmarks;

return args switch
{
    ["document", ..] => DocumentBenchmark.Run(args[1..]),
    _ => Usage(),
};

static int Usage()
{
    Console.Error.WriteLine("""
        usage: document FILE [--iterations N] [--threads T] [--json]   simulate a document in process; medians of 3 after a warm-up
        """);
    return 2;
}
