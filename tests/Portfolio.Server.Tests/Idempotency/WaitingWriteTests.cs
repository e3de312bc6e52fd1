using System.Net;
using System.Text;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Idempotency;

/// <summary>A second request while the first is at work.</summary>
public sealed class WaitingWriteTests
{
    [Fact]
    public async Task ItWaitsFiveSecondsThenIsToldSo()
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        // More than fits on the way: what has been sent is being read.
        var write = Write.All["postRun"] with { Body = new string(' ', 1 << 20) + """{"iterations":10}""" };
        var body = new HeldBody(write.Body);
        var first = PostAsync(client, body);
        await body.Begun;
        var waiting = write.SendAsync(client, "p", "slow");
        // The clock stands; each push lets whoever waits by now notice.
        while (!waiting.IsCompleted)
        {
            server.Clock.Advance(TimeSpan.FromSeconds(1));
            await Task.WhenAny(waiting, Task.Delay(50, TestContext.Current.CancellationToken));
        }
        var told = await waiting;
        Assert.Equal((HttpStatusCode.Conflict, "5"), (told.Status, told.RetryAfter));
        Assert.Contains("/problems/idempotency-key-in-use", told.Body);

        var patient = write.SendAsync(client, "p", "slow");
        body.Release();
        var done = await Said.OfAsync(await first);
        Assert.Equal((HttpStatusCode.Accepted, false), (done.Status, done.Again));
        var again = await patient;
        Assert.Equal((done, true), (again.Words(), again.Again));
    }

    private static Task<HttpResponseMessage> PostAsync(HttpClient client, HttpContent body)
    {
        var request = new HttpRequestMessage(HttpMethod.Post, "/v1/portfolios/p/runs") { Content = body };
        request.Headers.Add("Idempotency-Key", "slow");
        return client.SendAsync(request, TestContext.Current.CancellationToken);
    }

    /// <summary>A body whose end is held back.</summary>
    private sealed class HeldBody : HttpContent
    {
        private readonly byte[] bytes;
        private readonly TaskCompletionSource begun = new(), held = new();

        public HeldBody(string json)
        {
            bytes = Encoding.UTF8.GetBytes(json);
            Headers.ContentType = new("application/json") { CharSet = "utf-8" };
        }

        public Task Begun => begun.Task;

        public void Release() => held.SetResult();

        protected override async Task SerializeToStreamAsync(Stream stream, TransportContext? context)
        {
            await stream.WriteAsync(bytes.AsMemory(0, bytes.Length - 5));
            await stream.FlushAsync();
            begun.SetResult();
            await held.Task;
            await stream.WriteAsync(bytes.AsMemory(bytes.Length - 5));
        }

        protected override bool TryComputeLength(out long length) => (length = 0) > 0;
    }
}
