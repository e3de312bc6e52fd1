using System.Text;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Webhooks;

namespace Portfolio.Server.Tests.Telemetry;

/// <summary>Spans and measures leave by OTLP over HTTP, to a collector on this machine.</summary>
public sealed class ExportTests
{
    [Fact]
    public async Task TheSpanOfARunAndItsMeasuresArrive()
    {
        await using var collector = await Receiver.StartAsync();
        await using var server = new PortfolioServer(
            null, ("OTEL_EXPORTER_OTLP_ENDPOINT", $"http://127.0.0.1:{collector.Port}"), ("OTEL_EXPORTER_OTLP_PROTOCOL", "http/protobuf"),
            ("OTEL_BSP_SCHEDULE_DELAY", "100"), ("OTEL_METRIC_EXPORT_INTERVAL", "200"));
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain());
        var run = (await client.SucceedAsync("p")).Text("id");
        var span = await UntilAsync(collector, "/v1/traces", all => Spans(all).FirstOrDefault(each => IsOf(each, run)));
        Assert.Equal((16, 8), (Assert.Single(span.Field(1)).Length, Assert.Single(span.Field(2)).Length));
        // The request that asked for it is linked, not its parent: it is over.
        Assert.All(span.Field(4), parent => Assert.Equal(0, parent.Length));
        Assert.Single(span.Field(13));
        var names = await UntilAsync(
            collector, "/v1/metrics", all => Names(all) is var found && found.Contains("run.duration") ? found : null);
        Assert.Contains("run.iterations", names);
        Assert.All(
            Of(collector, "/v1/metrics"),
            sent => Assert.DoesNotContain(run, Encoding.Latin1.GetString(sent.Span), StringComparison.Ordinal));
    }

    [Fact]
    public async Task WithoutAnEndpointNothingIsCollected()
    {
        await using var server = new PortfolioServer();
        Assert.Null(server.Services.GetService(typeof(OpenTelemetry.Trace.TracerProvider)));
    }

    // opentelemetry/proto/collector/trace/v1: request → resource_spans 1 → scope_spans 2 → spans 2.
    private static IEnumerable<ReadOnlyMemory<byte>> Spans(IEnumerable<ReadOnlyMemory<byte>> requests) =>
        requests.SelectMany(request => request.Field(1)).SelectMany(resource => resource.Field(2)).SelectMany(scope => scope.Field(2));

    // Name 5; attributes 9 of key 1 and value 2 with text 1.
    private static bool IsOf(ReadOnlyMemory<byte> span, string run) =>
        Text(span.Field(5).Single()) == "run"
        && span.Field(9).Any(
            pair => Text(pair.Field(1).Single()) == "portfolio.run" && Text(pair.Field(2).Single().Field(1).Single()) == run);

    // Request → resource_metrics 1 → scope_metrics 2 → metrics 2 → name 1.
    private static List<string> Names(IEnumerable<ReadOnlyMemory<byte>> requests) =>
        [.. Spans(requests).Select(metric => Text(metric.Field(1).Single()))];

    private static async Task<T> UntilAsync<T>(Receiver collector, string path, Func<IEnumerable<ReadOnlyMemory<byte>>, T?> find)
    {
        while (true)
        {
            if (find(Of(collector, path)) is { } found && !Equals(found, default(T)))
                return found;
            await Task.Delay(50, TestContext.Current.CancellationToken);
        }
    }

    private static IEnumerable<ReadOnlyMemory<byte>> Of(Receiver collector, string path) =>
        collector.All.Where(received => received.Path == path).Select(received => (ReadOnlyMemory<byte>)received.Body);

    private static string Text(ReadOnlyMemory<byte> bytes) => Encoding.UTF8.GetString(bytes.Span);
}
