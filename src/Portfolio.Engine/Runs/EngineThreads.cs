using System.Runtime.ExceptionServices;
using System.Runtime.InteropServices;

namespace Portfolio.Engine.Runs;

/// <summary>The engine's own threads: never the pool's, and at lower priority, so that requests stay quick while a run works.</summary>
public static partial class EngineThreads
{
    private const int Niceness = 19;
    private const int StackBytes = 4 << 20;

    /// <summary>Runs the work on so many threads and waits; the first exception stops the others and is thrown here.</summary>
    internal static void Work(int threads, Action<CancellationToken> work, CancellationToken cancellation)
    {
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        ExceptionDispatchInfo? failure = null;
        var started = new Thread[threads];
        for (var t = 0; t < threads; t++)
        {
            started[t] = new Thread(Guarded, StackBytes) { IsBackground = true, Name = $"engine-{t}" };
            started[t].Start();
        }
        foreach (var thread in started)
            thread.Join();
        failure?.Throw();
        cancellation.ThrowIfCancellationRequested();

        void Guarded()
        {
            LowerPriority();
            try
            {
                work(stop.Token);
            }
            catch (Exception e)
            {
                Interlocked.CompareExchange(ref failure, ExceptionDispatchInfo.Capture(e), null);
                stop.Cancel();
            }
        }
    }

    /// <summary>Works something long and busy of a run, such as its results, on one such thread; what comes after runs elsewhere.</summary>
    public static Task<T> RunAsync<T>(Func<T> work)
    {
        const TaskCreationOptions own = TaskCreationOptions.LongRunning | TaskCreationOptions.RunContinuationsAsynchronously;
        return Task.Factory.StartNew(Low, CancellationToken.None, own, TaskScheduler.Default);

        T Low()
        {
            LowerPriority();
            return work();
        }
    }

    // Thread.Priority does nothing on Linux; there the priority of a thread is that of its task (setpriority(2), notes).
    private static void LowerPriority()
    {
        if (OperatingSystem.IsLinux())
            _ = SetPriority(0, 0, Niceness);
        else
            Thread.CurrentThread.Priority = ThreadPriority.BelowNormal;
    }

    [LibraryImport("libc", EntryPoint = "setpriority")]
    private static partial int SetPriority(int which, uint who, int priority);
}
