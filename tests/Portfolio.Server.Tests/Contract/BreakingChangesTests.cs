using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Contract;

/// <summary>The description may grow, but takes nothing back from the clients of the last accepted one.</summary>
public sealed class BreakingChangesTests
{
    private const string Before = """
        {"paths":{"/works":{
           "get":{"parameters":[{"name":"limit","in":"query","schema":{"type":"integer","minimum":1,"maximum":100}}],"x-rights":["read","admin"],
             "responses":{"200":{"headers":{"ETag":{"required":true}},"content":{"application/json":{"schema":{"$ref":"#/components/schemas/Work"}},"text/csv":{}}},"404":{}}},
           "put":{"requestBody":{"content":{"application/json":{"schema":{"$ref":"#/components/schemas/Sent"}}}},"responses":{"200":{}}}}},
         "components":{"schemas":{
           "Work":{"type":"object","required":["id"],"properties":{"id":{"type":"string"},"due":{"type":["null","string"],"format":"date"},"parts":{"type":"array","items":{"$ref":"#/components/schemas/Work"}}}},
           "Sent":{"type":"object","required":["id"],"properties":{"id":{"type":"string","maxLength":64},"day":{"type":"string","enum":["mon","tue"]},
             "length":{"oneOf":[{"type":"number"},{"type":"object","properties":{"type":{"const":"pert"}}}]},"of":{"$ref":"#/components/schemas/Sent"}}}}}}
        """;

    [Fact]
    public async Task NothingIsTakenBackFromTheAcceptedDescription()
    {
        var breaks = BreakingChanges.Between(await ReadAsync("accepted.json"), await ReadAsync("portfolio.json"));
        Assert.True(
            breaks.Count == 0,
            "Clients of openapi/accepted.json would break. If that is meant, copy openapi/portfolio.json over it and say why in CHANGELOG.md:"
            + Environment.NewLine + string.Join(Environment.NewLine, breaks));
    }

    [Theory]
    [InlineData("paths./works", null, "/works: the path is gone")]
    [InlineData("paths./works.put", null, "PUT /works: the operation is gone")]
    [InlineData("paths./works.get.responses.404", null, "GET /works: the status 404 is gone")]
    [InlineData("paths./works.get.responses.200.content.text/csv", null, "GET /works 200: the media type text/csv is gone")]
    [InlineData("paths./works.get.responses.200.headers.ETag.required", "false", "GET /works 200: the header ETag is no longer promised")]
    [InlineData("paths./works.get.parameters", "[]", "GET /works: the parameter query:limit is gone")]
    [InlineData("paths./works.get.parameters.0.required", "true", "GET /works: the parameter query:limit is required now")]
    [InlineData("paths./works.get.parameters.0.schema.maximum", "50", "GET /works query:limit: maximum was 100 and is 50")]
    [InlineData("paths./works.get.parameters.0.schema.minimum", "2", "GET /works query:limit: minimum was 1 and is 2")]
    [InlineData("paths./works.get.x-rights", """["admin"]""", "GET /works: the right 'read' no longer opens it")]
    [InlineData("paths./works.put.x-rights", """["admin"]""", "PUT /works: a right is needed now")]
    [InlineData("paths./works.put.requestBody.required", "true", "PUT /works: a body is required now")]
    [InlineData("components.schemas.Work.properties.due", null, "GET /works 200: the member due is gone")]
    [InlineData("components.schemas.Work.required", "[]", "GET /works 200: the member id is no longer promised")]
    [InlineData("components.schemas.Work.properties.id.type", "\"integer\"", "GET /works 200.id: may now be integer")]
    [InlineData("components.schemas.Work.properties.id.type", """["null","string"]""", "GET /works 200.id: may now be null")]
    [InlineData("components.schemas.Work.properties.due.format", null, "GET /works 200.due: format is no longer date")]
    [InlineData("components.schemas.Sent.required", """["id","day"]""", "PUT /works body: the member day is required now")]
    [InlineData("components.schemas.Sent.properties.day", null, "PUT /works body: the member day is gone")]
    [InlineData("components.schemas.Sent.properties.day.enum", """["mon"]""", "PUT /works body.day: no longer takes 'tue'")]
    [InlineData("components.schemas.Sent.properties.id.enum", """["a"]""", "PUT /works body.id: takes only certain words now")]
    [InlineData("components.schemas.Sent.properties.id.maxLength", "32", "PUT /works body.id: maxLength was 64 and is 32")]
    [InlineData("components.schemas.Sent.properties.id.pattern", "\"^a\"", "PUT /works body.id: pattern is now ^a")]
    [InlineData("components.schemas.Sent.properties.id.type", "\"integer\"", "PUT /works body.id: no longer takes string")]
    [InlineData("components.schemas.Sent.properties.length.oneOf.1", null, "PUT /works body.length: no longer takes pert")]
    [InlineData("components.schemas.Sent.additionalProperties", "false", "PUT /works body: other members are no longer taken")]
    public void WhatBreaksClientsIsNamed(string at, string? value, string named) => Assert.Equal([named], Changed(at, value));

    [Theory]
    [InlineData("paths./quays", """{"get":{"responses":{"200":{} } } }""")]
    [InlineData("paths./works.delete", """{"responses":{"204":{} } }""")]
    [InlineData("paths./works.get.responses.410", "{}")]
    [InlineData("paths./works.get.parameters.1", """{"name":"cursor","in":"query","schema":{"type":"string"} }""")]
    [InlineData("paths./works.get.parameters.0.schema.maximum", "1000")]
    [InlineData("paths./works.get.x-rights", """["read","submit","admin"]""")]
    [InlineData("components.schemas.Work.properties.note", """{"type":"string"}""")]
    [InlineData("components.schemas.Work.required", """["id","due"]""")]
    [InlineData("components.schemas.Work.properties.due.type", "\"string\"")]
    [InlineData("components.schemas.Sent.required", "[]")]
    [InlineData("components.schemas.Sent.properties.note", """{"type":"string"}""")]
    [InlineData("components.schemas.Sent.properties.day.enum", """["mon","tue","wed"]""")]
    [InlineData("components.schemas.Sent.properties.id.maxLength", null)]
    [InlineData("components.schemas.Sent.properties.length.oneOf.2", """{"type":"string"}""")]
    public void WhatIsAddedPasses(string at, string? value) => Assert.Empty(Changed(at, value));

    private static IReadOnlyList<string> Changed(string at, string? value)
    {
        var (before, after) = (JsonNode.Parse(Before)!.AsObject(), JsonNode.Parse(Before)!.AsObject());
        // Media types and paths have no dots.
        var steps = at.Split('.');
        var owner = steps[..^1].Aggregate((JsonNode)after, (node, step) => node is JsonArray list ? list[Index(step)]! : node[step]!);
        if (owner is JsonArray items)
        {
            if (value is null)
                items.RemoveAt(Index(steps[^1]));
            else
                items.Insert(Index(steps[^1]), JsonNode.Parse(value));
        }
        else if (value is null)
        {
            Assert.True(owner.AsObject().Remove(steps[^1]));
        }
        else
        {
            owner[steps[^1]] = JsonNode.Parse(value);
        }
        return BreakingChanges.Between(before, after);
    }

    private static int Index(string step) => int.Parse(step, System.Globalization.CultureInfo.InvariantCulture);

    private static async Task<JsonObject> ReadAsync(string file) =>
        JsonNode.Parse(await File.ReadAllTextAsync(Path.Combine(Repository.Root, "openapi", file), TestContext.Current.CancellationToken))!.AsObject();
}
