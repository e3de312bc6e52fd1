using System.Collections.Concurrent;
using System.Diagnostics;
using System.Text;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.DependencyInjection.Extensions;
using Microsoft.Extensions.Logging;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Server.Tests.Webhooks;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Attacks;

/// <summary>Secrets are planted wherever they pass through the server, and looked for wherever it writes.</summary>
public sealed class SecretTests : ILoggerProvider, ILogger
{
    private const string Wrong = "a-key-that-nobody-knows-pelican-0123456789";
    private const string InBody = "only-in-a-body-shearwater";

    private readonly ConcurrentQueue<string> logged = [];
    private readonly ConcurrentQueue<string> answered = [];

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task SecretsStandInNoLogAnswerTraceOrFile()
    {
        using var traces = Listen();
        var directory = Directory.CreateTempSubdirectory("portfolio-").FullName;
        try
        {
            var secrets = new List<string> { PortfolioServer.AdminKey, Wrong };
            await using (var server = new PortfolioServer(directory, ("Logging:LogLevel:Default", "Trace")) 
            {
                Outside = services => services.RemoveAll<ILoggerProvider>().AddSingleton<ILoggerProvider>(this),
            })
            {
                var key = await server.Services.GetRequiredService<KeyStore>().CreateAsync(
                    Caller.System, "of a test", [new Grant(Right.Read, "p")], expiresAt: null, Cancellation);
                secrets.Add(key!.Secret);
                secrets.AddRange(await AskEverythingAsync(server, PortfolioServer.AdminKey, key.Secret, Wrong));
                await RefusedBodiesAsync(server);
            }
            Assert.NotEmpty(logged);
            Assert.All(secrets, secret => Assert.DoesNotContain(logged, line => line.Contains(secret, StringComparison.Ordinal)));
            Assert.DoesNotContain(logged, line => line.Contains(InBody, StringComparison.Ordinal));
            Assert.All(secrets, secret => Assert.DoesNotContain(answered, answer => answer.Contains(secret, StringComparison.Ordinal)));
            foreach (var file in Directory.GetFiles(directory, "*", SearchOption.AllDirectories))
                Assert.All(secrets, secret => Assert.True(File.ReadAllBytes(file).AsSpan().IndexOf(Encoding.UTF8.GetBytes(secret)) < 0, file));
        }
        finally
        {
            Directory.Delete(directory, recursive: true);
        }
    }

    [Fact]
    public async Task WhatSignsForSubscriptionsStandsInNoLogAnswerOrTrace()
    {
        const string token = "only-in-a-url-gannet";
        using var traces = Listen();
        await using var receiver = await Receiver.StartAsync();
        // What a target answers is a stranger's text.
        receiver.Answer = (http, arrived) =>
        {
            http.Response.StatusCode = 500;
            http.Response.Headers["x-signature"] = arrived.Headers["webhook-signature"];
            return http.Response.WriteAsync($"{InBody} {arrived.Headers["webhook-signature"]}", Cancellation);
        };
        await using var server = new PortfolioServer(null, ("Logging:LogLevel:Default", "Trace"), ("Webhooks:AllowedHosts", "localhost"))
        {
            Outside = services => services.RemoveAll<ILoggerProvider>().AddSingleton<ILoggerProvider>(this),
        };
        var client = server.Client();
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var first = (await client.SubscribeAsync($"{receiver.Url}?token={token}", """{"type":"revision.created"}""", "office")).Text("secret");
        var second = (await (await client.PostJsonAsync(SubscriptionScene.Address + "/office/secret", "{}")).JsonAsync()).Text("secret");
        await client.PutJsonAsync("/v1/portfolios/p/document", Samples.Document("again"), "*");
        await SubscriptionScene.StateAsync(client, "office", "waiting", 1);
        await AskEverythingAsync(server, PortfolioServer.AdminKey);
        answered.Enqueue(await server.AuditTextAsync());

        var signatures = receiver.All.SelectMany(arrived => arrived.Headers["webhook-signature"].Split(' ')).ToList();
        Assert.True(signatures.Count >= 2);
        string[] secrets = [first, second, first["whsec_".Length..], second["whsec_".Length..], .. signatures];
        Assert.Contains(logged, line => line.Contains("localhost", StringComparison.Ordinal));
        Assert.All([.. secrets, token, InBody], secret => Assert.DoesNotContain(logged, line => line.Contains(secret, StringComparison.Ordinal)));
        Assert.All([.. secrets, InBody], secret => Assert.DoesNotContain(answered, answer => answer.Contains(secret, StringComparison.Ordinal)));
    }

    /// <summary>Every operation with every key, twice; returns the secrets that were made meanwhile, each of which is answered once.</summary>
    private async Task<List<string>> AskEverythingAsync(PortfolioServer server, params string[] keys)
    {
        await server.Client().PutJsonAsync("/v1/portfolios/p/document", Samples.Document());
        var made = new List<string>();
        var samples = new RequestSamples(await server.ApiAsync(), PathNames.Of("p", "latest"));
        foreach (var operation in (await server.ApiAsync()).Operations.Where(operation => operation.Method != "DELETE"))
            foreach (var key in keys.Concat(keys))
            {
                using var response = await server.Client(key).SendAsync(samples.Of(operation), Cancellation);
                var text = await response.TextAsync();
                var shown = response.IsSuccessStatusCode && response.Content.Headers.ContentType?.MediaType == "application/json" ? Secrets(JsonNode.Parse(text)).ToList() : [];
                made.AddRange(shown);
                answered.Enqueue($"{response.Headers}{shown.Aggregate(text, (rest, secret) => rest.Replace(secret, "", StringComparison.Ordinal))}");
            }
        return made;
    }

    private static IEnumerable<string> Secrets(JsonNode? json) => json switch
    {
        JsonObject things => things.SelectMany(member => member is { Key: "secret", Value: JsonValue value } ? [value.ToString()] : Secrets(member.Value)),
        JsonArray list => list.SelectMany(Secrets),
        _ => [],
    };

    private async Task RefusedBodiesAsync(PortfolioServer server)
    {
        foreach (var body in new[] { $$"""{"settings":{"name":"{{InBody}}"} }""", $$"""{"settings":{"name":"{{InBody}}",} }""", $"{InBody}", $"[\"{InBody}\"]" })
        {
            var refused = await server.Client().PutJsonAsync("/v1/portfolios/refused/document", body);
            Assert.InRange((int)refused.StatusCode, 400, 422);
            Assert.DoesNotContain(InBody, await refused.TextAsync());
        }
        Assert.True((await server.Client().PutJsonAsync("/v1/portfolios/taken/document", Samples.Document(InBody))).IsSuccessStatusCode);
    }

    private ActivityListener Listen()
    {
        var listener = new ActivityListener
        {
            ShouldListenTo = _ => true,
            Sample = (ref ActivityCreationOptions<ActivityContext> _) => ActivitySamplingResult.AllDataAndRecorded,
            ActivityStopped = span => logged.Enqueue($"{span.DisplayName} {string.Join(' ', span.TagObjects)} {string.Join(' ', span.Baggage)}"),
        };
        ActivitySource.AddActivityListener(listener);
        return listener;
    }

    ILogger ILoggerProvider.CreateLogger(string categoryName) => this;

    void IDisposable.Dispose()
    {
    }

    IDisposable? ILogger.BeginScope<TState>(TState state)
    {
        logged.Enqueue($"{state}");
        return null;
    }

    bool ILogger.IsEnabled(LogLevel logLevel) => true;

    void ILogger.Log<TState>(LogLevel logLevel, EventId eventId, TState state, Exception? exception, Func<TState, Exception?, string> formatter) =>
        logged.Enqueue($"{formatter(state, exception)} {exception}");
}
