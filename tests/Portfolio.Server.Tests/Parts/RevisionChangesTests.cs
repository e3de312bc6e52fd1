using System.Net;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Parts;

public sealed class RevisionChangesTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task EachPlaceComesWithOldAndNew()
    {
        var at = await client.PortfolioAsync("changes");
        await client.PutJsonAsync(at + "/projects/weir", PartCalls.Weir
            .Replace("""[{"id":"A10","duration":5""", """[{"id":"A05","duration":1},{"id":"A10","duration":6""")
            .Replace("\"mode\":3", "\"mode\":4").Replace("""["A10","quay/B10"]""", """["A10"]""").Replace("\"programme\":\"river\",", ""));
        Assert.Equal(
            [
                """/projects/weir/activities/A05 - {"id":"A05","duration":1}""",
                "/projects/weir/activities/A10/duration 5 6",
                "/projects/weir/activities/A20/duration/mode 3 4",
                """/projects/weir/activities/A20/predecessors ["A10","quay/B10"] ["A10"]""",
                """/projects/weir/programme "river" -""",
            ],
            await ChangesAsync(client, at + "/revisions/2/changes"));
        await client.RemoveAsync(at + "/projects/quay", "*");
        Assert.Equal([$"/projects/quay {PartCalls.Quay} -"], await ChangesAsync(client, at + "/revisions/3/changes"));
        await client.PatchAsync(at + "/settings", """{"name":"Works"}""");
        Assert.Equal(["""/settings/name "Harbour" "Works" """.TrimEnd()], await ChangesAsync(client, at + "/revisions/4/changes"));
        await (await client.ReadAsync(at + "/revisions/5/changes")).ProblemAsync(404, "not-found");
    }

    [Fact]
    public async Task ANewOrderIsOneChangeOfTheList()
    {
        var at = await client.PortfolioAsync("order");
        var turned = PartCalls.Quay.Replace("""[{"id":"B10","duration":4},{"id":"B20","duration":3,"predecessors":["B10"]}]""", """[{"id":"B20","duration":3,"predecessors":["B10"]},{"id":"B10","duration":4}]""");
        await client.PutJsonAsync(at + "/document", $$"""{"settings":{{PartCalls.Settings}},"projects":[{{turned}},{{PartCalls.Weir}}]}""", "*");
        Assert.Equal(
            ["""/projects ["weir","quay"] ["quay","weir"]""", """/projects/quay/activities ["B10","B20"] ["B20","B10"]"""],
            await ChangesAsync(client, at + "/revisions/2/changes"));
    }

    [Fact]
    public async Task TheyComeInPagesAndOnlyOfPartsThatMayBeRead()
    {
        var at = await client.PortfolioAsync("some");
        var read = await client.ReadAsync(at + "/revisions/1/changes?limit=2");
        Assert.Equal(HttpStatusCode.NotModified, (await client.ReadAsync(at + "/revisions/1/changes?limit=2", read.Tag())).StatusCode);
        Assert.Equal([$"/settings - {PartCalls.Settings}", $"/projects/weir - {PartCalls.Weir}"], await ChangesAsync(client, at + "/revisions/1/changes?limit=2"));
        Assert.Equal([$"/projects/quay - {PartCalls.Quay}"], await ChangesAsync(client, read.Headers.GetValues("Link").Single().Split('<', '>')[1]));
        var some = await fixture.Server.ClientAsync(new Grant(Right.Read, "some", ["weir"]));
        Assert.Equal([$"/projects/weir - {PartCalls.Weir}"], await ChangesAsync(some, at + "/revisions/1/changes"));
        await (await client.ReadAsync(at + "/revisions/1/changes?cursor=-1")).ProblemAsync(422, "refused");
    }

    [Fact]
    public async Task ANoteIsShownToWhoMayReadSomethingThatTheRevisionChanged()
    {
        var at = await client.PortfolioAsync("notes");
        await client.PatchAsync(at + "/projects/weir?note=of+the+weir", """{"name":"W"}""");
        await client.PatchAsync(at + "/projects/quay?note=of+the+quay", """{"name":"Q"}""");
        await client.PatchAsync(at + "/settings?note=of+all", """{"name":"S"}""");
        await client.PutJsonAsync(at + "/document?note=of+both", $$"""{"settings":{{PartCalls.Settings}},"projects":[{{PartCalls.Weir}},{{PartCalls.Quay}}]}""", "*");
        var some = await fixture.Server.ClientAsync(new Grant(Right.Read, "notes", ["weir"]));
        Assert.Equal(["5 of both", "4 of all", "3 of the quay", "2 of the weir", "1 -"], await NotesAsync(client, at));
        Assert.Equal(["5 of both", "4 -", "3 -", "2 of the weir", "1 -"], await NotesAsync(some, at));
        Assert.DoesNotContain("quay", await (await some.ReadAsync(at + "/revisions/3")).TextAsync());
        Assert.Contains("weir", await (await some.ReadAsync(at + "/revisions/2")).TextAsync());
    }

    private static async Task<IReadOnlyList<string>> NotesAsync(HttpClient who, string at) =>
        [.. (await (await who.ReadAsync(at + "/revisions")).JsonAsync()).GetProperty("items").EnumerateArray().Select(revision =>
            $"{revision.GetProperty("revision")} {(revision.TryGetProperty("note", out var note) ? note.GetString() : "-")}")];

    private static async Task<IReadOnlyList<string>> ChangesAsync(HttpClient who, string address) =>
        [.. (await (await who.ReadAsync(address)).JsonAsync()).GetProperty("items").EnumerateArray().Select(change =>
            $"{change.GetProperty("path").GetString()} {Value(change, "old")} {Value(change, "new")}")];

    private static string Value(System.Text.Json.JsonElement change, string member) =>
        change.TryGetProperty(member, out var value) ? value.GetRawText() : "-";
}
