using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests;

public sealed class ApiDescriptionTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    [Fact]
    public async Task TheCommittedDescriptionIsTheOneServed()
    {
        var committed = await File.ReadAllTextAsync(Path.Combine(Repository.Root, "openapi", "portfolio.json"), TestContext.Current.CancellationToken);
        var served = await (await fixture.Server.Client(key: null).ReadAsync("/openapi.json")).TextAsync();
        Assert.True(
            JsonNode.DeepEquals(JsonNode.Parse(committed), JsonNode.Parse(served)),
            "openapi/portfolio.json differs from what the server describes: build the server and commit the file.");
    }

    [Fact]
    public async Task ADistributionIsANumberOrOneOfEightClosedObjects()
    {
        var document = await (await fixture.Server.Client(key: null).ReadAsync("/openapi.json")).JsonAsync();
        Assert.StartsWith("3.1", document.GetProperty("openapi").GetString());
        var forms = document.GetProperty("components").GetProperty("schemas").GetProperty("Distribution").GetProperty("oneOf").EnumerateArray().ToList();
        Assert.Equal("number", forms[0].GetProperty("type").GetString());
        string[] types = ["constant", "uniform", "triangular", "pert", "normal", "lognormal", "discrete", "percentiles"];
        Assert.Equal(types, forms.Skip(1).Select(form => form.GetProperty("properties").GetProperty("type").GetProperty("const").GetString()));
        Assert.All(forms.Skip(1), form => Assert.False(form.GetProperty("additionalProperties").GetBoolean()));
    }

    [Fact]
    public async Task WhatTheDescriptionSaysOfItselfIsComplete()
    {
        var document = await (await fixture.Server.Client(key: null).ReadAsync("/openapi.json")).JsonAsync();
        Assert.Equal("/", Assert.Single(document.GetProperty("servers").EnumerateArray()).GetProperty("url").GetString());
        Assert.Equal("MIT", document.GetProperty("info").GetProperty("license").GetProperty("identifier").GetString());
        Assert.All(document.GetProperty("tags").EnumerateArray(), tag => Assert.True(tag.TryGetProperty("description", out _), tag.ToString()));
        var dates = document.GetProperty("paths").EnumerateObject().SelectMany(path => path.Value.EnumerateObject())
            .Where(operation => operation.Value.TryGetProperty("parameters", out _))
            .SelectMany(operation => operation.Value.GetProperty("parameters").EnumerateArray())
            .Where(parameter => parameter.GetProperty("name").GetString() is "asOf" or "from" or "to").ToList();
        Assert.NotEmpty(dates);
        Assert.All(dates, date => Assert.Equal("date", date.GetProperty("schema").GetProperty("format").GetString()));
    }

    [Fact]
    public async Task RequestsAreClosedAndAnswersOpen()
    {
        var schemas = (await (await fixture.Server.Client(key: null).ReadAsync("/openapi.json")).JsonAsync()).GetProperty("components").GetProperty("schemas");
        foreach (var name in new[] { "Document", "Settings", "Project", "Activity", "RiskEvent" })
            Assert.False(schemas.GetProperty(name).GetProperty("additionalProperties").GetBoolean());
        foreach (var name in new[] { "Problem", "Fault", "Written", "Revision" })
            Assert.False(schemas.GetProperty(name).TryGetProperty("additionalProperties", out _));
    }
}
