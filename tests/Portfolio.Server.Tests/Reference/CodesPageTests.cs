using Portfolio.Server.Problems;

namespace Portfolio.Server.Tests.Reference;

/// <summary>docs/codes.md says what the program says; with <c>PORTFOLIO_WRITE=1</c> the test writes it instead.</summary>
public sealed class CodesPageTests
{
    private const string Command =
        "PORTFOLIO_WRITE=1 dotnet run --project tests/Portfolio.Server.Tests -c Release -- --filter-class '*CodesPageTests'";

    private static readonly string File = Path.Combine(Repository.Root, "docs", "codes.md");

    [Theory]
    [InlineData("problems")]
    [InlineData("codes")]
    [InlineData("cautions")]
    public async Task TheTableIsThatOfTheProgram(string table)
    {
        var (start, end) = ($"<!-- {table}: start -->\n", $"<!-- {table}: end -->");
        var text = await System.IO.File.ReadAllTextAsync(File, TestContext.Current.CancellationToken);
        var (from, to) = (text.IndexOf(start, StringComparison.Ordinal) + start.Length, text.IndexOf(end, StringComparison.Ordinal));
        Assert.True(from >= start.Length && to > from, $"docs/codes.md has lost the marks of its table of {table}.");
        var made = table switch { "problems" => Problems(), "codes" => Codes(CodeMeanings.OfFaults), _ => Codes(CodeMeanings.OfCautions) };
        if (Environment.GetEnvironmentVariable("PORTFOLIO_WRITE") == "1")
            await System.IO.File.WriteAllTextAsync(File, text[..from] + made + text[to..], TestContext.Current.CancellationToken);
        else
            Assert.True(text[from..to] == made, $"docs/codes.md differs from the program; this writes it anew:\n{Command}");
    }

    [Fact]
    public void EveryCodeHasOneMeaning()
    {
        IReadOnlyList<CodeMeaning> all = [.. CodeMeanings.OfFaults, .. CodeMeanings.OfCautions];
        Assert.Empty(all.Where(code => !code.Meaning.EndsWith('.')).Select(code => $"{code.Code} needs a [Description]: a sentence."));
        Assert.Empty(all.GroupBy(code => code.Code).Where(same => same.Count() > 1).Select(same => $"{same.Key} has two meanings."));
    }

    private static string Problems() => Table(
        "| Type | Status | Meaning | What to do |\n|---|---|---|---|",
        ProblemKinds.All.Select(kind => $"| `{kind.Slug}` | {(kind.Status == 0 ? "any" : kind.Status)} | {kind.Meaning} | {kind.Remedy} |"));

    private static string Codes(IEnumerable<CodeMeaning> codes) =>
        Table("| Code | Meaning |\n|---|---|", codes.Select(code => $"| `{code.Code}` | {code.Meaning} |"));

    private static string Table(string head, IEnumerable<string> rows) => $"\n{head}\n{string.Join('\n', rows)}\n\n";
}
