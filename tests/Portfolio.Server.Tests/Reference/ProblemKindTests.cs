using System.Globalization;
using System.Text.RegularExpressions;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Tests.Reference;

/// <summary>What the sources answer with is what the pages explain; nothing more and nothing less.</summary>
public sealed partial class ProblemKindTests
{
    [GeneratedRegex("""\b(?:new(?: Problem)?|(?<conflict>Conflict))\(\s*(?:(?<status>\d{3}|status), )?\s*(?:"(?<slug>[a-z-]+)"|ProblemKinds\.(?<name>\w+)),""")]
    private static partial Regex Made();

    [GeneratedRegex(@"\bnew Problem\(|\bProblem\.Conflict\(")]
    private static partial Regex Any();

    [Fact]
    public void EveryProblemThatIsAnsweredHasAPage()
    {
        var made = Sources().SelectMany(file => Slugs(file.Text)).Distinct().ToList();
        var listed = ProblemKinds.All.Select(kind => (kind.Slug, kind.Status)).ToList();
        Assert.Empty(made.Except(listed).Select(each => $"{each} is answered, but not listed in ProblemKinds."));
        Assert.Empty(listed.Except(made).Select(each => $"{each} is listed in ProblemKinds, but never answered."));
        Assert.Equal(listed.Count, listed.Select(each => each.Slug).Distinct().Count());
    }

    [Fact]
    public void NoProblemIsMadeInAWayThatTheTestAboveOverlooks()
    {
        foreach (var (name, text) in Sources())
            foreach (Match any in Any().Matches(text))
                Assert.True(
                    Made().Matches(text).Any(made => made.Index <= any.Index + any.Length && any.Index < made.Index + made.Length),
                    $"{name}: give the status and the slug of the problem as literals: {text.Substring(any.Index, 40)}");
    }

    [Fact]
    public void EveryKindSaysWhatItMeansAndWhatToDo() =>
        Assert.All(ProblemKinds.All, kind =>
        {
            Assert.EndsWith(".", kind.Meaning, StringComparison.Ordinal);
            Assert.EndsWith(".", kind.Remedy, StringComparison.Ordinal);
        });

    private static IEnumerable<(string Slug, int Status)> Slugs(string text) => Made().Matches(text)
        .Where(made => made.Groups["conflict"].Success || made.Groups["status"].Success)
        .Select(made => (
            made.Groups["slug"].Success ? made.Groups["slug"].Value : Constant(made.Groups["name"].Value),
            made.Groups["conflict"].Success ? 409
            : int.TryParse(made.Groups["status"].Value, CultureInfo.InvariantCulture, out var status) ? status : 0));

    private static string Constant(string name) => (string)typeof(ProblemKinds).GetField(name)!.GetRawConstantValue()!;

    private static IEnumerable<(string Name, string Text)> Sources()
    {
        var server = Path.Combine(Repository.Root, "src", "Portfolio.Server");
        return Directory.GetFiles(server, "*.cs", SearchOption.AllDirectories)
            .Where(file => Path.GetRelativePath(server, file).Split(Path.DirectorySeparatorChar)[0] is not ("bin" or "obj"))
            .Select(file => (Path.GetRelativePath(server, file), File.ReadAllText(file)));
    }
}
