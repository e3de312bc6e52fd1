using System.Collections.Concurrent;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Http;
using Microsoft.Extensions.Logging;

namespace Portfolio.Server.Tests.Webhooks;

/// <summary>A request as it arrived.</summary>
internal sealed record Received(string Path, IReadOnlyDictionary<string, string> Headers, byte[] Body)
{
    public string Id => Headers["webhook-id"];
}

/// <summary>A target on this machine that remembers what arrives and answers as the test wants.</summary>
internal sealed class Receiver : IAsyncDisposable
{
    private readonly WebApplication app;
    private readonly ConcurrentQueue<Received> received = new();

    private Receiver(WebApplication app) => this.app = app;

    /// <summary>Decides on the answer; 204 unless a test says otherwise.</summary>
    public Func<HttpContext, Received, Task> Answer { get; set; } = (http, _) =>
    {
        http.Response.StatusCode = 204;
        return Task.CompletedTask;
    };

    public IReadOnlyList<Received> All => [.. received];

    public int Port { get; private set; }

    /// <summary>Its address by a name that the tests allow.</summary>
    public string Url => $"http://localhost:{Port}/risk";

    public static async Task<Receiver> StartAsync(int port = 0)
    {
        var builder = WebApplication.CreateSlimBuilder();
        builder.Logging.ClearProviders();
        var app = builder.Build();
        app.Urls.Add($"http://127.0.0.1:{port}");
        var receiver = new Receiver(app);
        app.MapFallback(receiver.TakeAsync);
        await app.StartAsync(TestContext.Current.CancellationToken);
        receiver.Port = new Uri(app.Urls.Single()).Port;
        return receiver;
    }

    public void AnswerWith(int status) => Answer = (http, _) =>
    {
        http.Response.StatusCode = status;
        return Task.CompletedTask;
    };

    /// <summary>Waits until so many requests have arrived; the whole suite's timeout is the only limit.</summary>
    public async Task<IReadOnlyList<Received>> UntilAsync(int count)
    {
        while (received.Count < count)
            await Task.Delay(20, TestContext.Current.CancellationToken);
        return All;
    }

    private async Task TakeAsync(HttpContext http)
    {
        using var body = new MemoryStream();
        await http.Request.Body.CopyToAsync(body);
        var headers = http.Request.Headers.ToDictionary(header => header.Key, header => header.Value.ToString(), StringComparer.OrdinalIgnoreCase);
        var arrived = new Received(http.Request.Path, headers, body.ToArray());
        received.Enqueue(arrived);
        await Answer(http, arrived);
    }

    public ValueTask DisposeAsync() => app.DisposeAsync();
}
