namespace Portfolio.Engine.Runs;

/// <summary>How a run is worked; nothing here changes a result.</summary>
/// <param name="Threads">Threads that work, at least 1; they are the run's own, at lower priority than requests.</param>
/// <param name="Progress">Called with the iterations done so far, from the threads that work.</param>
public sealed record RunOptions(int Threads, Action<int>? Progress = null);
