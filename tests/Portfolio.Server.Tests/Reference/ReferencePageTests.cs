using System.Net;
using System.Text.Json;
using System.Xml.Linq;
using Portfolio.Server.Problems;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Reference;

public sealed class ReferencePageTests(ServerFixture fixture) : IClassFixture<ServerFixture>
{
    private readonly HttpClient stranger = fixture.Server.Client(key: null);

    public static TheoryData<string> Pages => [.. ProblemKinds.All.Select(kind => "/problems/" + kind.Slug), "/docs", "/problems"];

    [Theory]
    [MemberData(nameof(Pages))]
    public async Task APageNeedsNoKeyNoScriptAndNothingFromElsewhere(string address)
    {
        var response = await stranger.ReadAsync(address);
        Assert.Equal((HttpStatusCode.OK, "text/html; charset=utf-8"), (response.StatusCode, response.Content.Headers.ContentType!.ToString()));
        Assert.StartsWith(
            "default-src 'none'; style-src 'self'; frame-ancestors 'none'; base-uri 'none'",
            response.Headers.GetValues("Content-Security-Policy").Single(), StringComparison.Ordinal);
        Assert.Equal("nosniff", response.Headers.GetValues("X-Content-Type-Options").Single());
        var page = await PageAsync(response);
        var names = page.Descendants().Select(element => element.Name.LocalName).ToHashSet(StringComparer.Ordinal);
        Assert.DoesNotContain(names, name => name is "script" or "style" or "img" or "iframe" or "form");
        Assert.DoesNotContain(
            page.Descendants().Attributes(),
            attribute => attribute.Name == "style" || attribute.Name.LocalName.StartsWith("on", StringComparison.Ordinal));
        Assert.All(Links(page), link => Assert.Matches("^[#/](?!/)", link));
    }

    [Theory]
    [MemberData(nameof(Pages))]
    public async Task APageCanBeReadByEar(string address)
    {
        var page = await PageAsync(await stranger.ReadAsync(address));
        Assert.Equal("en", page.Attribute("lang")!.Value);
        Assert.NotEmpty(page.Element("head")!.Element("title")!.Value);
        Assert.Equal("#content", page.Element("body")!.Elements().First().Attribute("href")!.Value);
        Assert.Equal("content", Assert.Single(page.Descendants("main")).Attribute("id")!.Value);
        Assert.All(page.Descendants("nav"), nav => Assert.NotEmpty(nav.Attribute("aria-label")!.Value));
        Assert.All(page.Descendants("th"), header => Assert.Contains(header.Attribute("scope")!.Value, (string[])["col", "row"]));
        Assert.All(page.Descendants("table"), table => Assert.NotEmpty(table.Element("caption")!.Value));
        var levels = page.Descendants().Where(element => element.Name.LocalName is "h1" or "h2" or "h3")
            .Select(heading => heading.Name.LocalName[1] - '0').ToList();
        Assert.Equal(1, Assert.Single(levels, level => level == 1));
        Assert.All(levels.Zip(levels.Skip(1)), pair => Assert.True(pair.Second <= pair.First + 1, "A level of headings is left out."));
        // An element without content that HTML does not know as empty would swallow what follows it.
        var empty = page.Descendants().Where(element => element.IsEmpty).Select(element => element.Name.LocalName).Distinct();
        Assert.Equal(["link", "meta"], empty.Order());
    }

    [Fact]
    public async Task EveryLinkLeadsSomewhere()
    {
        var reached = new HashSet<string>(StringComparer.Ordinal);
        foreach (var address in Pages.Select(row => row.Data))
        {
            var page = await PageAsync(await stranger.ReadAsync(address));
            var ids = page.Descendants().Attributes("id").Select(id => "#" + id.Value).ToList();
            Assert.Equal(ids.Distinct(), ids);
            Assert.All(Links(page).Where(link => link[0] == '#'), link => Assert.Contains(link, ids));
            reached.UnionWith(Links(page).Where(link => link[0] == '/'));
        }
        Assert.Contains("/docs/style.css", reached);
        foreach (var address in reached)
            Assert.Equal(HttpStatusCode.OK, (await stranger.ReadAsync(address)).StatusCode);
    }

    [Fact]
    public async Task EveryOperationAndSchemaOfTheDescriptionIsThere()
    {
        using var described = JsonDocument.Parse(await File.ReadAllTextAsync(
            Path.Combine(Repository.Root, "openapi", "portfolio.json"), TestContext.Current.CancellationToken));
        var page = await PageAsync(await stranger.ReadAsync("/docs"));
        var sections = page.Descendants("section").ToDictionary(section => section.Attribute("id")!.Value, StringComparer.Ordinal);
        foreach (var path in described.RootElement.GetProperty("paths").EnumerateObject())
            foreach (var method in path.Value.EnumerateObject())
            {
                var section = sections[method.Value.GetProperty("operationId").GetString()!];
                Assert.Equal($"{method.Name.ToUpperInvariant()} {path.Name}", section.Element("h3")!.Value);
                // Line breaks of comments come as they are.
                Assert.Contains(method.Value.GetProperty("summary").GetString()!, section.Value, StringComparison.Ordinal);
                var cells = section.Descendants("th").Select(cell => cell.Value).ToHashSet(StringComparer.Ordinal);
                Assert.All(method.Value.GetProperty("responses").EnumerateObject(), answer => Assert.Contains(answer.Name, cells));
                if (method.Value.TryGetProperty("parameters", out var parameters))
                    Assert.All(parameters.EnumerateArray(), each => Assert.Contains(each.GetProperty("name").GetString()!, cells));
            }
        foreach (var schema in described.RootElement.GetProperty("components").GetProperty("schemas").EnumerateObject())
            Assert.Equal(schema.Name, sections["schema-" + schema.Name].Element("h3")!.Value);
        Assert.Contains("Right needed: submit or manage or admin", sections["putProject"].Value, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ThePageOfRefusedContentNamesEveryCode()
    {
        var page = await PageAsync(await stranger.ReadAsync("/problems/refused"));
        var rows = page.Descendants("tbody").Single().Elements("tr").Select(row => (row.Element("th")!.Value, row.Element("td")!.Value));
        Assert.Equal(CodeMeanings.OfFaults.Select(each => (each.Code, each.Meaning)), rows);
    }

    [Fact]
    public async Task WhatIsKnownIsNotSentAgain()
    {
        var tag = (await stranger.ReadAsync("/docs")).Tag();
        Assert.Equal(HttpStatusCode.NotModified, (await stranger.ReadAsync("/docs", tag)).StatusCode);
    }

    [Theory]
    [InlineData("nothing-known")]
    [InlineData("%3Cscript%3E")]
    public async Task AKindThatIsNotThereIsAProblemItself(string slug) =>
        await (await stranger.ReadAsync("/problems/" + slug)).ProblemAsync(404, "not-found");

    [Fact]
    public async Task TheStyleIsReadableOnDarkAndLightGround()
    {
        var response = await stranger.ReadAsync("/docs/style.css");
        Assert.Equal("text/css", response.Content.Headers.ContentType!.MediaType);
        var style = await response.TextAsync();
        Assert.Contains("prefers-color-scheme: dark", style, StringComparison.Ordinal);
        Assert.DoesNotContain("url(", style, StringComparison.Ordinal);
        Assert.DoesNotContain("@import", style, StringComparison.Ordinal);
    }

    private static async Task<XElement> PageAsync(HttpResponseMessage response)
    {
        var text = await response.TextAsync();
        Assert.StartsWith("<!DOCTYPE html>\n", text, StringComparison.Ordinal);
        return XElement.Parse(text["<!DOCTYPE html>".Length..]);
    }

    private static IEnumerable<string> Links(XElement page) =>
        page.Descendants().Attributes().Where(attribute => attribute.Name.LocalName is "href" or "src").Select(link => link.Value);
}
