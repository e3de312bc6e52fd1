using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Outbox;

namespace Portfolio.Store.Runs;

/// <summary>
/// What happens to a run is told twice in the transaction in which it happens: to the audit trail and to those who listen.
/// </summary>
internal static class RunEvents
{
    public static async Task TellAsync(StoreTransaction open, Caller caller, string portfolio, string run, string what, object detail)
    {
        await AuditChain.AppendAsync(open, caller.KeyId, $"run.{what}", $"portfolios/{portfolio}/runs/{run}", detail);
        await OutboxStore.AppendAsync(open, portfolio, $"run.{what}", run, detail);
    }
}
