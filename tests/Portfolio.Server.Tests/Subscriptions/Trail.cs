using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Tests.Subscriptions;

internal static class Trail
{
    /// <summary>The newest part of the audit trail as text.</summary>
    public static async Task<string> AuditTextAsync(this PortfolioServer server)
    {
        var entries = await server.Services.GetRequiredService<AuditStore>()
            .ListAsync(Caller.System, null, 100, TestContext.Current.CancellationToken);
        return string.Join('\n', entries.Select(entry => $"{entry.Action} {entry.Object} {entry.Detail}"));
    }
}
