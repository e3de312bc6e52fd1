using System.Globalization;
using System.Net;
using System.Net.Http.Headers;
using System.Net.Sockets;
using Microsoft.Extensions.Options;
using Portfolio.Server.Events;
using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Webhooks;

/// <summary>
/// Posts one event to one target: signed, to checked addresses, without redirects, proxies or cookies. Of the answer only the status
/// counts.
/// </summary>
internal sealed class WebhookSender : IDisposable
{
    private readonly HttpClient client;
    private readonly TargetRule rule;
    private readonly EventEnvelope envelope;
    private readonly TimeProvider clock;
    private readonly WebhookOptions options;

    public WebhookSender(
        GuardedConnections connections, TargetRule rule, EventEnvelope envelope, TimeProvider clock, IOptions<WebhookOptions> options)
    {
        (this.rule, this.envelope, this.clock, this.options) = (rule, envelope, clock, options.Value);
        client = new HttpClient(new SocketsHttpHandler
        {
            ConnectCallback = connections.ConnectAsync,
            AllowAutoRedirect = false,
            UseProxy = false,
            UseCookies = false,
            AutomaticDecompression = DecompressionMethods.None,
            // Names are looked up and checked again now and then.
            PooledConnectionLifetime = TimeSpan.FromMinutes(1),
            MaxConnectionsPerServer = this.options.Senders,
            MaxResponseHeadersLength = 16,
            // What is left of an answer is not worth its connection.
            MaxResponseDrainSize = 0,
            // No trace of ours is a stranger's business.
            ActivityHeadersPropagator = null,
        })
        {
            Timeout = Timeout.InfiniteTimeSpan,
        };
        client.DefaultRequestHeaders.UserAgent.Add(new ProductInfoHeaderValue("Portfolio", "1"));
    }

    /// <exception cref="OperationCanceledException">The process stops.</exception>
    public async Task<AttemptResult> SendAsync(DeliveryLease held, CancellationToken stopping)
    {
        // Allowed hosts may have become fewer since the subscription was written.
        if (rule.Check(held.Url) is { Count: > 0 } flaws)
            return new AttemptResult(null, $"The URL {flaws[0].Message}");
        using var limit = CancellationTokenSource.CreateLinkedTokenSource(stopping);
        limit.CancelAfter(options.Timeout);
        try
        {
            using var request = Request(held);
            using var answer = await client.SendAsync(request, HttpCompletionOption.ResponseHeadersRead, limit.Token);
            await PassOverAsync(answer, limit.Token);
            var status = (int)answer.StatusCode;
            return new AttemptResult(status is >= 100 and <= 599 ? status : null, Why(status), RetryAt(answer));
        }
        catch (OperationCanceledException) when (!stopping.IsCancellationRequested)
        {
            return new AttemptResult(null, $"There was no whole answer within {options.TimeoutSeconds} seconds.");
        }
        catch (Exception failure) when (failure is HttpRequestException or IOException or SocketException or TargetRefused)
        {
            return new AttemptResult(null, Why(failure));
        }
    }

    private HttpRequestMessage Request(DeliveryLease held)
    {
        var (bytes, type) = envelope.Body(held.Event);
        var timestamp = clock.GetUtcNow().ToUnixTimeSeconds();
        var content = new ReadOnlyMemoryContent(bytes);
        content.Headers.ContentType = MediaTypeHeaderValue.Parse(type.ToString());
        return new HttpRequestMessage(HttpMethod.Post, held.Url)
        {
            Content = content,
            Headers =
            {
                { "webhook-id", held.Event.Id },
                { "webhook-timestamp", timestamp.ToString(CultureInfo.InvariantCulture) },
                { "webhook-signature", WebhookSecrets.Sign(held.Secrets, held.Event.Id, timestamp, bytes.Span) },
            },
        };
    }

    /// <summary>Reads a short answer to its end, so that the connection can serve again; a longer one is broken off.</summary>
    private async Task PassOverAsync(HttpResponseMessage answer, CancellationToken cancellation)
    {
        var buffer = new byte[4096];
        await using var body = await answer.Content.ReadAsStreamAsync(cancellation);
        for (int read, left = options.AnswerBytes; left > 0; left -= read)
        {
            read = await body.ReadAsync(buffer.AsMemory(0, Math.Min(left, buffer.Length)), cancellation);
            if (read == 0)
                return;
        }
    }

    /// <summary>What a target that is too busy says about the next attempt (RFC 9110, 10.2.3).</summary>
    private DateTimeOffset? RetryAt(HttpResponseMessage answer) =>
        answer is { StatusCode: HttpStatusCode.TooManyRequests or HttpStatusCode.ServiceUnavailable, Headers.RetryAfter: { } wanted }
            ? wanted.Date ?? clock.GetUtcNow() + wanted.Delta
            : null;

    private static string? Why(int status) => status switch
    {
        >= 200 and < 300 => null,
        >= 300 and < 400 => $"The target answered {status}; redirects are not followed.",
        410 => "The target answered 410: it is gone for good.",
        < 100 or > 599 => $"The target answered {status:000}, which is no status of HTTP.",
        _ => $"The target answered {status}.",
    };

    private static string Why(Exception failure) => failure switch
    {
        TargetRefused => failure.Message,
        { InnerException: TargetRefused inner } => inner.Message,
        SocketException { SocketErrorCode: SocketError.HostNotFound or SocketError.NoData or SocketError.TryAgain } =>
            "The host's name cannot be looked up.",
        { InnerException: SocketException inner } => Why(inner),
        HttpRequestException { HttpRequestError: HttpRequestError.SecureConnectionError } =>
            "No secure connection could be made: look at the target's certificate.",
        SocketException or HttpRequestException { HttpRequestError: HttpRequestError.ConnectionError } => "No connection could be made.",
        _ => "The connection broke off before the answer.",
    };

    public void Dispose() => client.Dispose();
}
