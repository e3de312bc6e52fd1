using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using System.Text;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;

namespace Portfolio.Server.Tests.Attacks;

/// <summary>The server as it listens to the world, and what the world may send: refused soon, and without much memory.</summary>
[Collection(nameof(Alone))]
public sealed class AttackTests(ListeningServer listening) : IClassFixture<ListeningServer>
{
    private const string Document = "/v1/portfolios/never-made/document";
    private const int MiB = 1024 * 1024;

    private static readonly TimeSpan Soon = TimeSpan.FromSeconds(1);

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task AHundredMegabytesAreRefused()
    {
        var piece = Encoding.ASCII.GetBytes(new string(' ', MiB));
        var stated = new RawRequest(RawRequest.Line("PUT", Document, "Content-Type: application/json", $"Content-Length: {100 * MiB}"), Enumerable.Repeat(piece, 100));
        await RefusedAsync(413, stated);
        await RefusedAsync(413, RawRequest.Json("POST", "/v1/portfolios/attacked/runs", new byte[9 * MiB]));
        // Without a stated length it has to be received up to the limit.
        byte[] chunk = [.. Encoding.ASCII.GetBytes($"{MiB:x}\r\n"), .. piece, .. "\r\n"u8];
        RawRequest Chunked(string method, string target) => new(
            RawRequest.Line(method, target, "Content-Type: application/json", "Transfer-Encoding: chunked"), Enumerable.Repeat(chunk, 100));
        await RefusedAsync(413, Chunked("POST", "/v1/portfolios/attacked/runs"));
        var before = listening.Server.Resident;
        Assert.Equal(413, (await Chunked("PUT", Document).SendAsync(listening.Port)).Status);
        AssertLittleMemory(before);
    }

    [Theory]
    [InlineData('[')]
    [InlineData('{')]
    public async Task DeepJsonIsRefused(char open)
    {
        var nested = open == '[' ? new string('[', 100_000) : string.Concat(Enumerable.Repeat("{\"settings\":", 100_000));
        await RefusedAsync(400, RawRequest.Json("PUT", Document, Encoding.ASCII.GetBytes(nested)));
        await RefusedAsync(400, RawRequest.Json("POST", "/v1/portfolios/attacked/runs", Encoding.ASCII.GetBytes(nested)));
    }

    [Theory]
    [InlineData("{\"settings\":{\"seed\":1e999999999},\"projects\":[]}", 422)]
    [InlineData("{\"settings\":{\"seed\":DIGITS},\"projects\":[]}", 422)]
    [InlineData("{\"settings\":{\"name\":\"\u00ff\"},\"projects\":[]}", 400)]
    [InlineData("{\"settings\":{\"name\":\"\\ud800\"},\"projects\":[]}", 400)]
    [InlineData("\u00ff\u00fe{\0}\0", 400)]
    [InlineData("\0", 400)]
    public async Task NumbersAndTextsThatAreNoneAreRefused(string latin, int status)
    {
        var body = Encoding.Latin1.GetBytes(latin.Replace("DIGITS", new string('9', 1_000_000), StringComparison.Ordinal));
        await RefusedAsync(status, RawRequest.Json("PUT", Document, body));
    }

    [Theory]
    [InlineData("/v1/portfolios/%00/document")]
    [InlineData("/v1/portfolios/a%00b/document")]
    [InlineData("/v1/portfolios/../../../../etc/passwd")]
    [InlineData("/v1/%2e%2e/%2e%2e/etc/passwd")]
    [InlineData("/v1/portfolios/..%2f..%2fetc%2fpasswd/document")]
    [InlineData("/v1/portfolios/%c0%ae%c0%ae/document")]
    [InlineData("/v1/portfolios/%ff%fe/document")]
    [InlineData("/v1/portfolios/%zz/document")]
    [InlineData("/v1/portfolios/\u00ff/document")]
    [InlineData("//v1//portfolios//x//document")]
    [InlineData("/v1\\portfolios\\x\\document")]
    [InlineData("/v1/portfolios/x/document;jsessionid=1")]
    [InlineData("http://elsewhere/v1/portfolios/x/document")]
    [InlineData("*")]
    public async Task PathsThatTrickAreRefused(string target)
    {
        var answer = await RefusedAsync(null, new RawRequest(RawRequest.Line("GET", target)));
        Assert.DoesNotContain("root:", answer);
        Assert.DoesNotContain("   at ", answer);
    }

    [Fact]
    public async Task HeadersAndTargetsBeyondAllMeasureAreRefused()
    {
        await RefusedAsync(431, new RawRequest(RawRequest.Line("GET", "/v1/portfolios", [.. Enumerable.Range(0, 10_000).Select(i => $"X-{i}: {i}")])));
        await RefusedAsync(431, new RawRequest(RawRequest.Line("GET", "/v1/portfolios", "X-Long: " + new string('x', MiB))));
        await RefusedAsync(414, new RawRequest(RawRequest.Line("GET", "/v1/portfolios?" + new string('x', MiB))));
        await RefusedAsync(400, new RawRequest(RawRequest.Line("PUT", Document, "Content-Length: 5", "Content-Length: 6")));
        await RefusedAsync(400, new RawRequest(RawRequest.Line("PUT", Document, "Content-Length: -1")));
        await RefusedAsync(400, new RawRequest("GARBAGE\r\n\r\n"));
    }

    [Fact]
    public async Task WhoTricklesOrJustHoldsConnectionsKeepsNobodyOut()
    {
        var before = listening.Server.Resident;
        var held = new List<TcpClient>();
        try
        {
            for (var i = 0; i < 1_000; i++)
            {
                var socket = new TcpClient();
                held.Add(socket);
                await socket.ConnectAsync(IPAddress.Loopback, listening.Port, Cancellation);
                // Half of them say nothing, half begin a body that never comes.
                if (i % 2 == 0)
                    await socket.GetStream().WriteAsync(
                        Encoding.ASCII.GetBytes(RawRequest.Line("PUT", Document, "Content-Type: application/json", "Content-Length: 1000") + "{"), Cancellation);
            }
            await SoonAsync(async () =>
            {
                var began = Stopwatch.GetTimestamp();
                Assert.Equal(HttpStatusCode.OK, (await listening.Server.Client.ReadAsync("/v1/portfolios")).StatusCode);
                return Stopwatch.GetElapsedTime(began);
            });
            AssertLittleMemory(before);
            // Too slow a body is given up, with an answer or without.
            var waited = Stopwatch.StartNew();
            var end = await held[0].GetStream().ReadAsync(new byte[4096], Cancellation);
            Assert.True(waited.Elapsed < TimeSpan.FromMinutes(1), $"A body of which nothing comes is waited for {waited.Elapsed}; then {end} bytes.");
        }
        finally
        {
            held.ForEach(socket => socket.Dispose());
        }
    }

    /// <summary>Asserts that the request is refused soon and costs little memory; returns the answer.</summary>
    /// <param name="status">The status; null: any refusal that is the client's fault.</param>
    private async Task<string> RefusedAsync(int? status, RawRequest request)
    {
        var before = listening.Server.Resident;
        var answer = "";
        await SoonAsync(async () =>
        {
            (var given, answer, var took) = await request.SendAsync(listening.Port);
            Assert.True(status is { } expected ? given == expected : given is >= 400 and < 500, $"{given}: {answer}");
            return took;
        });
        AssertLittleMemory(before);
        Assert.Equal(HttpStatusCode.OK, (await listening.Server.Client.ReadAsync("/health/live")).StatusCode);
        return answer;
    }

    private void AssertLittleMemory(long before) =>
        Assert.True(listening.Server.Resident - before < 200 * MiB, $"{(listening.Server.Resident - before) / MiB} MB more are resident.");

    // The machine may be busy with other things: late is what is late again and again, and by more than the processors are in demand.
    private static async Task SoonAsync(Func<Task<TimeSpan>> ask)
    {
        var (took, demand) = (TimeSpan.MaxValue, 1.0);
        for (var time = 0; time < 5 && took > Soon * demand; time++)
        {
            took = await ask();
            demand = Math.Max(1, await LoadAsync() / Environment.ProcessorCount);
        }
        Assert.True(took <= Soon * demand, $"Answered after {took}.");
    }

    /// <summary>How many processes want a processor, over the last minute; 0 where that is not known.</summary>
    private static async Task<double> LoadAsync() => File.Exists("/proc/loadavg")
        ? double.Parse((await File.ReadAllTextAsync("/proc/loadavg", Cancellation)).Split(' ')[0], System.Globalization.CultureInfo.InvariantCulture)
        : 0;
}

/// <summary>A server of its own that listens on a port.</summary>
public sealed class ListeningServer : IAsyncLifetime
{
    private readonly string directory = Directory.CreateTempSubdirectory("portfolio-").FullName;

    internal ServerProcess Server { get; private set; } = null!;

    internal int Port => Server.Client.BaseAddress!.Port;

    public async ValueTask InitializeAsync()
    {
        Server = await ServerProcess.StartAsync(directory, ("Roles", "api"));
        // What the first requests load is no part of what an attack costs.
        Assert.True((await Server.Client.PutJsonAsync("/v1/portfolios/attacked/document", Samples.Document())).IsSuccessStatusCode);
    }

    public ValueTask DisposeAsync()
    {
        Server.Dispose();
        Directory.Delete(directory, recursive: true);
        return ValueTask.CompletedTask;
    }
}
