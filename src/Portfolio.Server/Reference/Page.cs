using System.Xml.Linq;

namespace Portfolio.Server.Reference;

/// <summary>The frame of every page, and the few elements that pages share. XML nodes encode whatever they are given.</summary>
internal static class Page
{
    public const string StyleAddress = "/docs/style.css";

    public static string Of(string title, params object[] content)
    {
        var html = new XElement(
            "html", new XAttribute("lang", "en"),
            new XElement(
                "head",
                new XElement("meta", new XAttribute("charset", "utf-8")),
                new XElement(
                    "meta", new XAttribute("name", "viewport"), new XAttribute("content", "width=device-width, initial-scale=1")),
                new XElement("title", $"{title} – Portfolio"),
                new XElement("link", new XAttribute("rel", "stylesheet"), new XAttribute("href", StyleAddress))),
            new XElement(
                "body",
                new XElement("a", new XAttribute("class", "skip"), new XAttribute("href", "#content"), "Skip to the content"),
                new XElement(
                    "header",
                    new XElement(
                        "nav", new XAttribute("aria-label", "Pages"),
                        Link("/docs", "Reference"), " ", Link("/problems", "Problems"), " ", Link("/openapi.json", "OpenAPI document"))),
                new XElement("main", new XAttribute("id", "content"), new XElement("h1", title), content)));
        return "<!DOCTYPE html>\n" + html.ToString(SaveOptions.DisableFormatting);
    }

    public static XElement Link(string address, string text) => new("a", new XAttribute("href", address), text);

    /// <summary>A section that can be linked to, under a heading of this level.</summary>
    public static XElement Section(string id, int level, object heading, params object?[] content) =>
        new("section", new XAttribute("id", id), new XElement($"h{level}", heading), content);

    /// <summary>A paragraph for each line of the text; none for no text.</summary>
    public static IEnumerable<XElement> Text(string? text) =>
        (text ?? "").Split("\n\n", StringSplitOptions.RemoveEmptyEntries).Select(part => new XElement("p", part));

    public static XElement Code(string text) => new("code", text);

    /// <summary>A table with a caption; the first cell of a row is its header. Nothing without rows.</summary>
    public static XElement? Table(string caption, string[] columns, IEnumerable<object[]> rows)
    {
        var body = rows.Select(row => new XElement(
            "tr",
            row.Select((cell, i) => i == 0
                ? new XElement("th", new XAttribute("scope", "row"), cell)
                : new XElement("td", cell)))).ToList();
        return body.Count == 0 ? null : new XElement(
            "table",
            new XElement("caption", caption),
            new XElement("thead", new XElement("tr", columns.Select(name => new XElement("th", new XAttribute("scope", "col"), name)))),
            new XElement("tbody", body));
    }
}
