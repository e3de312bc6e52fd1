namespace Portfolio.Server.Jobs;

/// <summary>
/// Says within this process that something about runs has changed: one was queued, or asked to stop. Our tables are the truth; a signal
/// that is lost costs the wait for the next sweep, one too many costs nothing. Thread safe.
/// </summary>
public sealed class RunSignal
{
    /// <summary>Raised on the thread that gives the signal; must not wait.</summary>
    public event Action? Given;

    public void Give() => Given?.Invoke();
}
