namespace Portfolio.Server.Jobs;

/// <summary>
/// Says within this process that there may be something to tell or to send. Our tables are the truth; a signal that is lost costs the wait
/// for the next look, one too many costs nothing. Thread safe.
/// </summary>
public sealed class EventSignal
{
    private volatile TaskCompletionSource given = new(TaskCreationOptions.RunContinuationsAsynchronously);

    /// <summary>Completed by the next <see cref="Give"/>: take it before looking, so that no signal falls between.</summary>
    public Task Next => given.Task;

    public void Give()
    {
        var before = given;
        given = new(TaskCreationOptions.RunContinuationsAsynchronously);
        before.TrySetResult();
    }
}
