using System.Globalization;
using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Parts;

namespace Portfolio.Server.Tests.Updates;

/// <summary>Random updates, each sent three ways: as a question, as JSON and as the equal table.</summary>
public sealed class UpdatePropertyTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private const int Seed = 20270104;

    private readonly HttpClient client = fixture.Server.Client();

    [Fact]
    public async Task ATableAndTheEqualJsonGiveTheSameDocumentAndADryRunForetellsIt()
    {
        var random = new Random(Seed);
        var (spoken, tabled) = (await client.PortfolioAsync("spoken"), await client.PortfolioAsync("tabled"));
        var accepted = 0;
        for (var round = 0; round < 60; round++)
        {
            var (json, csv) = RandomUpdate(random);
            var before = await client.DocumentAsync(spoken);
            var told = await client.UpdateAsync(spoken, json, "?dryRun=true");
            Assert.Equal(before, await client.DocumentAsync(spoken));
            var (first, second) = (await client.UpdateAsync(spoken, json), await client.UpdateTableAsync(tabled, csv));
            Assert.True(first.StatusCode == second.StatusCode && first.StatusCode == told.StatusCode, $"{json}\n{csv}\n{await first.TextAsync()}\n{await second.TextAsync()}");
            Assert.Equal(await client.DocumentAsync(spoken), await client.DocumentAsync(tabled));
            if (!first.IsSuccessStatusCode)
            {
                Assert.Equal(before, await client.DocumentAsync(spoken));
                continue;
            }
            var written = await first.JsonAsync();
            var foretold = JsonNode.Parse(await told.TextAsync())!;
            Assert.Equal(written.GetProperty("changed").GetBoolean(), (bool)foretold["changed"]!);
            if (!written.GetProperty("changed").GetBoolean())
                continue;
            accepted++;
            var changes = JsonNode.Parse(await (await client.ReadAsync($"{spoken}/revisions/{written.GetProperty("revision")}/changes?limit=1000")).TextAsync())!["items"];
            Assert.True(JsonNode.DeepEquals(changes, foretold["changes"]), $"{json}\n{foretold["changes"]}\n{changes}");
        }
        Assert.True(accepted > 20, $"seed {Seed}: only {accepted} were accepted");
    }

    /// <summary>Cells for some things and members, in both forms.</summary>
    private static (string Json, string Csv) RandomUpdate(Random random)
    {
        string[] columns = ["project", "activity", "statusDate", "overhead.actual", "name", "duration", "duration.type", "duration.low", "duration.high", "cost.actual", "cost.fixed", "earliestStart", "actualStart", "remaining"];
        var rows = new List<string> { string.Join(',', columns) };
        var updates = new JsonArray();
        foreach (var (project, activities) in new[] { ("weir", new[] { "A10", "A20" }), ("quay", ["B10", "B20"]) })
        {
            if (random.Next(3) == 0)
                continue;
            var own = new Dictionary<string, string?>();
            Some(random, own, "statusDate", "2027-02-01", "2027-03-01");
            Some(random, own, "overhead.actual", "9", "12.5", null);
            Some(random, own, "name", "Weir", "\"x, \"\"y\"\"\"", null);
            var entry = Entry("project", project, own);
            rows.Add(Row(columns, project, "", own));
            var list = new JsonArray();
            foreach (var activity in activities.Where(_ => random.Next(2) == 0))
            {
                var cells = new Dictionary<string, string?>();
                if (random.Next(2) == 0)
                    (cells["duration.type"], cells["duration.low"], cells["duration.high"]) = ("uniform", "1", random.Next(0, 6).ToString(CultureInfo.InvariantCulture));
                else
                    Some(random, cells, "duration", "4", "7.5");
                Some(random, cells, "cost.actual", "10", null);
                Some(random, cells, "cost.fixed", "100", "250.5", null);
                Some(random, cells, "earliestStart", "2027-05-01", null);
                Some(random, cells, "actualStart", "2027-01-05", null);
                Some(random, cells, "remaining", "3", null);
                list.Add(Entry("id", activity, cells));
                rows.Add(Row(columns, project, activity, cells));
            }
            entry["activities"] = list;
            updates.Add(entry);
        }
        return (new JsonObject { ["updates"] = updates }.ToJsonString(), string.Join("\r\n", rows) + "\r\n");
    }

    private static void Some(Random random, Dictionary<string, string?> cells, string member, params string?[] values)
    {
        if (random.Next(2) == 0)
            cells[member] = values[random.Next(values.Length)];
    }

    private static JsonObject Entry(string key, string id, Dictionary<string, string?> cells)
    {
        var entry = new JsonObject { [key] = id };
        foreach (var (member, cell) in cells)
        {
            var steps = member.Split('.');
            var owner = steps.Length == 1 ? entry : (JsonObject)(entry[steps[0]] ??= new JsonObject());
            owner[steps[^1]] = cell is null ? null
                : double.TryParse(cell, CultureInfo.InvariantCulture, out var number) ? number
                : cell.StartsWith('"') ? cell[1..^1].Replace("\"\"", "\"") : cell;
        }
        return entry;
    }

    private static string Row(string[] columns, string project, string activity, Dictionary<string, string?> cells) =>
        string.Join(',', columns.Select(column =>
            column == "project" ? project : column == "activity" ? activity : cells.TryGetValue(column, out var cell) ? cell ?? "null" : ""));
}
