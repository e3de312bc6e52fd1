using System.Globalization;
using System.Xml.Linq;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Reference;

/// <summary>The pages that the types of problems lead to.</summary>
internal static class ProblemPages
{
    public static string List() => Page.Of(
        "Problems",
        new XElement("p", "A refusal is a problem document (RFC 9457) whose type leads to one of these pages."),
        Page.Table(
            "Kinds of problems", ["Type", "Status", "Meaning"],
            ProblemKinds.All.Select(kind => new object[] { Page.Link("/problems/" + kind.Slug, kind.Slug), Status(kind), kind.Meaning }))!);

    /// <summary>Null when there is no such kind.</summary>
    public static string? One(string slug) =>
        ProblemKinds.All.FirstOrDefault(kind => kind.Slug == slug) is { } kind ? Page.Of(
            kind.Slug,
            new XElement(
                "dl",
                new XElement("dt", "Status"), new XElement("dd", Status(kind)),
                new XElement("dt", "What it means"), new XElement("dd", kind.Meaning),
                new XElement("dt", "What to do"), new XElement("dd", kind.Remedy)),
            slug == ProblemKinds.Refused ? Codes() : "") : null;

    private static XElement Codes() => Page.Section(
        "codes", 2, "Codes of faults",
        new XElement("p", "A code never changes its meaning."),
        Page.Table(
            "Codes in 'errors'", ["Code", "Meaning"],
            CodeMeanings.OfFaults.Select(each => new object[] { Page.Code(each.Code), each.Meaning })));

    private static string Status(ProblemKind kind) => kind.Status == 0 ? "any" : kind.Status.ToString(CultureInfo.InvariantCulture);
}
