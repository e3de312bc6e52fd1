using System.Text.Json;
using Portfolio.Engine.Results;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Results;

namespace Portfolio.Server.Tests.Results;

public sealed class RunWarningsTests
{
    private const string Fresh = """
        {"id":"quay","programme":"harbour","statusDate":"2026-11-30",
         "activities":[{"id":"A","duration":{"type":"uniform","low":10,"high":20},"cost":{"fixed":5}}]}
        """;

    [Fact]
    public void EveryRunSaysWhatItsFiguresAreNot()
    {
        var codes = Of(Fresh).Select(warning => warning.Code).ToArray();
        Assert.Contains("covers.entered-only", codes);
        Assert.Contains("sampling.not-input", codes);
        Assert.DoesNotContain(CautionCodes.StaleStatus, codes);
        Assert.DoesNotContain(CautionCodes.DatesClamped, codes);
    }

    [Fact]
    public void OldProgressIsNamedWithTheScopesItTouches()
    {
        // 2026-10-26 is 36 days before 2026-12-01, 2026-10-27 is 35.
        var stale = Single(Of(Fresh, Old("weir", "2026-10-26"), Old("dyke", "2026-10-27")), CautionCodes.StaleStatus);
        Assert.Equal(["weir"], stale.Subjects!);
        Assert.Equal(["portfolio", "programme/locks", "project/weir"], stale.Scopes!);
    }

    [Fact]
    public void FinishedWorkDoesNotGrowOld()
    {
        var done = """{"id":"dyke","statusDate":"2026-01-05","activities":[{"id":"A","duration":3,"actualStart":"2025-12-01","actualFinish":"2025-12-05"}]}""";
        Assert.DoesNotContain(Of(Fresh, done), warning => warning.Code == CautionCodes.StaleStatus);
    }

    [Fact]
    public void FinishesBeyondTheLastDateAreNamed()
    {
        var endless = """{"id":"canal","statusDate":"2026-11-30","activities":[{"id":"A","duration":{"type":"uniform","low":10,"high":90000}}]}""";
        var clamped = Single(Of(Fresh, endless), CautionCodes.DatesClamped);
        Assert.Equal(["canal"], clamped.Subjects!);
    }

    [Fact]
    public void RareRisksMakeLevelsUnderAdd()
    {
        // Each project alone holds nothing at 80 %, the four together do: 1 − 0.85⁴ = 48 % of iterations meet at least one loss.
        string Risky(string id) => $$"""
            {"id":"{{id}}","statusDate":"2026-11-30","activities":[{"id":"A","duration":5}],
             "riskEvents":[{"id":"loss","probability":0.15,"impacts":[{"cost":1000}]}]}
            """;
        var warning = Single(Of(Risky("a"), Risky("b"), Risky("c"), Risky("d")), "levels.under-add");
        Assert.Equal(["portfolio"], warning.Scopes!);
    }

    private static string Old(string id, string statusDate) => $$$"""
        {"id":"{{{id}}}","programme":"locks","statusDate":"{{{statusDate}}}",
         "activities":[{"id":"A","duration":{"type":"uniform","low":10,"high":20}}]}
        """;

    private static WarningJson Single(IEnumerable<WarningJson> warnings, string code) => Assert.Single(warnings, warning => warning.Code == code);

    private static IReadOnlyList<WarningJson> Of(params string[] projects)
    {
        var plan = SmallPortfolio.Plan("""{"name":"x","currency":"EUR","confidence":[80]}""", projects);
        var result = SmallPortfolio.Finish(plan, SmallPortfolio.Facts(iterations: 2_000));
        return JsonSerializer.Deserialize(result.Warnings, ResultsContext.Plain.IReadOnlyListWarningJson)!;
    }
}
