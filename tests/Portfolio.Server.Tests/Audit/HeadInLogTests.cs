using System.Collections.Concurrent;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Audit;

/// <summary>The head of the trail leaves the server by its log, so that a trail cut short can be told from a whole one.</summary>
public sealed class HeadInLogTests : ILoggerProvider, ILogger
{
    private readonly ConcurrentQueue<string> logged = [];

    [Fact]
    public async Task TheHeadStandsInTheLogAtTheStart()
    {
        await using var server = new PortfolioServer(null, ("Logging:LogLevel:Default", "Information"))
        {
            Outside = services => services.AddSingleton<ILoggerProvider>(this),
        };
        var head = (await (await server.Client().ReadAsync("/v1/audit?limit=1")).JsonAsync()).GetProperty("items")[0];
        var line = $"The audit trail has {head.GetProperty("sequence").GetInt64()} entries, head {head.Text("hash")}.";
        while (!logged.Contains(line))
            await Task.Delay(20, TestContext.Current.CancellationToken);
    }

    public ILogger CreateLogger(string categoryName) => this;

    public bool IsEnabled(LogLevel logLevel) => true;

    public IDisposable? BeginScope<TState>(TState state)
        where TState : notnull => null;

    void ILogger.Log<TState>(LogLevel logLevel, EventId eventId, TState state, Exception? exception, Func<TState, Exception?, string> formatter) =>
        logged.Enqueue(formatter(state, exception));

    public void Dispose()
    {
    }
}
