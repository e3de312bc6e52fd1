using System.Collections.Concurrent;
using System.Diagnostics;

namespace Portfolio.Server.Tests.Jobs;

/// <summary>Hears of the blocks of one run that are stored, by the spans that tell of them.</summary>
internal sealed class BlockSpans : IDisposable
{
    private readonly ActivityListener listener;
    private Action? then;
    private int left = -1;

    public BlockSpans(string run)
    {
        listener = new ActivityListener
        {
            ShouldListenTo = source => source.Name == "Portfolio.Server",
            Sample = (ref ActivityCreationOptions<ActivityContext> _) => ActivitySamplingResult.AllData,
            ActivityStopped = span => Hear(span, run),
        };
        ActivitySource.AddActivityListener(listener);
    }

    public ConcurrentQueue<int> Stored { get; } = [];

    /// <summary>Acts when so many more blocks have been stored, before the next one.</summary>
    public void After(int count, Action action) => (left, then) = (count, action);

    private void Hear(Activity span, string run)
    {
        if (span.OperationName != "run.block" || span.Status != ActivityStatusCode.Ok || (string?)span.GetTagItem("portfolio.run") != run)
            return;
        Stored.Enqueue((int)span.GetTagItem("portfolio.block")!);
        if (Interlocked.Decrement(ref left) == 0)
            then!();
    }

    public void Dispose() => listener.Dispose();
}
