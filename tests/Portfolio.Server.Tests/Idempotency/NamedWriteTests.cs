using System.Net;
using System.Text.Json;
using System.Text.RegularExpressions;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Idempotency;

/// <summary>Writes with a key of their own have their effect once, whoever asks again and when.</summary>
public sealed class NamedWriteTests
{
    public static TheoryData<string> Operations => [.. Write.All.Keys];

    [Fact]
    public async Task EveryWriteOfTheDescriptionIsTested()
    {
        await using var server = new PortfolioServer();
        var paths = (await (await server.Client(key: null).ReadAsync("/openapi.json")).JsonAsync()).GetProperty("paths");
        var writes = paths.EnumerateObject().SelectMany(path => path.Value.EnumerateObject()).Where(operation => operation.Name != "get")
            .Select(operation => operation.Value).ToList();
        Assert.Equal(
            writes.Select(write => write.GetProperty("operationId").GetString()!).Order(StringComparer.Ordinal),
            Write.All.Keys.Order(StringComparer.Ordinal));
        Assert.All(writes, write => Assert.Contains(
            "Idempotency-Key", write.GetProperty("parameters").EnumerateArray().Select(parameter => parameter.Text("name"))));
    }

    [Theory]
    [MemberData(nameof(Operations))]
    public async Task TheFirstAnswerIsGivenAgainAndNothingDoneTwice(string operation)
    {
        var write = Write.All[operation];
        var (server, client, run) = await Write.PrepareAsync();
        await using var _ = server;
        var before = await StateAsync(client);
        var first = await write.SendAsync(client, "p", "once", run);
        Assert.True((int)first.Status is >= 200 and < 300 && !first.Again, first.ToString());
        var after = await StateAsync(client);
        Assert.NotEqual(before, after);

        var second = await write.SendAsync(client, "p", "once", run);
        Assert.True(second.Again);
        Assert.Equal(first.Words(), second.Words());
        Assert.DoesNotContain("secret\"", second.Body, StringComparison.Ordinal);
        Assert.Equal(after, await StateAsync(client));

        var other = await (write with { IfMatch = write.IfMatch is null ? "*" : "\"other\"", Body = write.Body is null ? null : write.Body + " " }).SendAsync(client, "p", "once", run);
        Assert.Equal(HttpStatusCode.UnprocessableEntity, other.Status);
        Assert.Contains("/problems/idempotency-key-reused", other.Body);
        Assert.Equal(after, await StateAsync(client));
    }

    [Theory]
    [MemberData(nameof(Operations))]
    public async Task AnAnswerThatIsKeptIsTheOneGivenWithoutAKey(string operation)
    {
        var answers = new List<Said>();
        foreach (var key in new[] { null, "named" })
        {
            var (server, client, run) = await Write.PrepareAsync();
            await using var _ = server;
            answers.Add(await Write.All[operation].SendAsync(client, "p", key, run));
        }
        // Runs and keys are named anew each time.
        Assert.Equal(Nameless(answers[0]), Nameless(answers[1]));
    }

    [Fact]
    public async Task FiftyAtOnceHaveOneEffectAndOneAnswer()
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        foreach (var operation in new[] { "postRun", "putDocument" })
        {
            var answers = await Task.WhenAll(Enumerable.Range(0, 50).Select(
                _ => Task.Run(() => Write.All[operation].SendAsync(client, "p", "fifty"))));
            Assert.Equal(49, answers.Count(answer => answer.Again));
            Assert.Single(answers.Select(answer => answer.Words()).Distinct());
            Assert.True((int)answers[0].Status is 200 or 202, answers[0].ToString());
        }
        Assert.Equal(2, (await ItemsAsync(client, "runs")).Count);
        Assert.Equal(2, (await ItemsAsync(client, "revisions")).Count);
    }

    [Fact]
    public async Task AnotherKeyAddressOrCallerIsAnotherWrite()
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        var write = Write.All["postRun"];
        var other = await server.ClientAsync(new Grant(Right.Manage, "p"));
        var answers = new[]
        {
            await write.SendAsync(client, "p", "a"), await write.SendAsync(client, "p", "b"), await write.SendAsync(other, "p", "a"),
            await (write with { Address = "runs?x=1" }).SendAsync(client, "p", "a"),
        };
        Assert.All(answers, answer => Assert.False(answer.Again));
        Assert.Equal(4, answers.Select(answer => answer.Location).Distinct().Count());
        Assert.True((await write.SendAsync(other, "p", "a")).Again);
    }

    [Fact]
    public async Task WhatWasRefusedIsNotRemembered()
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        var bad = Write.All["postRun"] with { Body = """{"iterations":5}""" };
        for (var i = 0; i < 2; i++)
        {
            var refused = await bad.SendAsync(client, "p", "mended");
            Assert.Equal((HttpStatusCode.UnprocessableEntity, false), (refused.Status, refused.Again));
        }
        var conflict = await (Write.All["putDocument"] with { IfMatch = "\"old\"" }).SendAsync(client, "p", "mended");
        Assert.Equal(HttpStatusCode.PreconditionFailed, conflict.Status);
        Assert.Equal(HttpStatusCode.Accepted, (await Write.All["postRun"].SendAsync(client, "p", "mended")).Status);
    }

    [Theory]
    [InlineData("umlaut-ü")]
    [InlineData("tab\tinside")]
    [InlineData("long")]
    public async Task AKeyHasOneTo255PrintableCharacters(string key)
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        var refused = await Write.All["postRun"].SendAsync(client, "p", key == "long" ? new string('k', 256) : key);
        Assert.Equal(HttpStatusCode.BadRequest, refused.Status);
        Assert.Contains("/problems/idempotency-key-invalid", refused.Body);
        Assert.Equal(HttpStatusCode.Accepted, (await Write.All["postRun"].SendAsync(client, "p", new string('k', 255))).Status);
    }

    [Fact]
    public async Task AfterTwoDaysTheKeyIsFree()
    {
        var (server, client, _) = await Write.PrepareAsync();
        await using var disposed = server;
        var write = Write.All["postRun"];
        await write.SendAsync(client, "p", "daily");
        server.Clock.Advance(TimeSpan.FromHours(47.9));
        Assert.True((await write.SendAsync(client, "p", "daily")).Again);
        server.Clock.Advance(TimeSpan.FromHours(0.2));
        var anew = await write.SendAsync(client, "p", "daily");
        Assert.Equal((HttpStatusCode.Accepted, false), (anew.Status, anew.Again));
        Assert.True((await write.SendAsync(client, "p", "daily")).Again);
    }

    private static Said Nameless(Said said) => said with
    {
        Body = Regex.Replace(said.Words().Body, "[0-9a-f]{8}-[0-9a-f-]{27}|[0-9a-f]{16}", "id"),
        Location = said.Location is null ? null : Regex.Replace(said.Location, "[0-9a-f-]{36}|[0-9a-f]{16}", "id"),
    };

    private static async Task<string> StateAsync(HttpClient client)
    {
        var state = new List<string>();
        foreach (var address in new[] { "document", "revisions", "runs", "schedule", "subscriptions", "subscriptions/office/deliveries" })
            state.Add(await (await client.ReadAsync($"/v1/portfolios/p/{address}")).TextAsync());
        state.Add(await (await client.ReadAsync("/v1/keys")).TextAsync());
        return Regex.Replace(string.Join('\n', state), "\"traceId\":\"[^\"]*\"", "");
    }

    private static async Task<IReadOnlyList<JsonElement>> ItemsAsync(HttpClient client, string list) =>
        [.. (await (await client.ReadAsync($"/v1/portfolios/p/{list}?limit=1000")).JsonAsync()).GetProperty("items").EnumerateArray()];
}
