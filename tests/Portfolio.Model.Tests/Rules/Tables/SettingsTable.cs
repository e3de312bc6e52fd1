using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;

namespace Portfolio.Model.Tests.Rules.Tables;

internal static class SettingsTable
{
    public static IEnumerable<RuleCase> Cases =>
    [
        Case(RuleCodes.TextLength, "name", s => s with { Name = new('a', 201) }, s => s with { Name = new('a', 200) }),
        Case(RuleCodes.TextControl, "name", s => s with { Name = "two\nlines" }, s => s with { Name = "é – 水" }),
        Case(RuleCodes.TextControl, "name", s => s with { Name = "next\u0085line" }, s => s with { Name = "no\u00a0break" }),
        Case(RuleCodes.CurrencyUnknown, "currency", s => s with { Currency = "eur" }, s => s with { Currency = "NOK" }),
        Case(RuleCodes.CurrencyUnknown, "currency", s => s with { Currency = "XAU" }, s => s with { Currency = "XOF", Commitments = null }),
        Case(RuleCodes.TimeZoneUnknown, "timeZone", s => s with { TimeZone = "Europe/Atlantis" }, s => s with { TimeZone = "UTC" }),
        Case(RuleCodes.TimeZoneUnknown, "timeZone", s => s with { TimeZone = "localtime" }, s => s with { TimeZone = "America/Argentina/Ushuaia" }),
        Case(RuleCodes.TimeZoneUnknown, "timeZone", s => s with { TimeZone = "../zoneinfo/UTC" }),
        Case(RuleCodes.FiscalYearStart, "fiscalYearStart", s => s with { FiscalYearStart = new(2, 29) }, s => s with { FiscalYearStart = new(2, 28) }),
        Case(RuleCodes.FiscalYearStart, "fiscalYearStart", s => s with { FiscalYearStart = new(13, 1) }, s => s with { FiscalYearStart = new(12, 31) }),
        Case(RuleCodes.ConfidenceRange, "confidence/1", s => s with { Confidence = [50, 100] }, s => s with { Confidence = [0.001, 99.999] }),
        Case(RuleCodes.ConfidenceRange, "confidence/0", s => s with { Confidence = [0] }, s => s with { Confidence = [] }),
        Case(RuleCodes.ConfidenceRepeated, "confidence/2", s => s with { Confidence = [80, 50, 80] }, s => s with { Confidence = [80, 50, 80.5] }),
        Case(RuleCodes.LimitExceeded, "confidence", s => s with { Confidence = Levels(100) }, s => s with { Confidence = Levels(99) }),
        Case(FaultCodes.NumberNotFinite, "confidence/0", s => s with { Confidence = [double.PositiveInfinity] }),
        Case(RuleCodes.SeedRange, "seed", s => s with { Seed = -1 }, s => s with { Seed = 0 }),
        Case(RuleCodes.SeedRange, "seed", s => s with { Seed = 1L << 53 }, s => s with { Seed = (1L << 53) - 1 }),
        Case(RuleCodes.IterationsRange, "iterations", s => s with { Iterations = 9 }, s => s with { Iterations = 10 }),
        Case(RuleCodes.IterationsRange, "iterations", s => s with { Iterations = 1_000_001 }, s => s with { Iterations = 1_000_000 }),
        Case(RuleCodes.DateRange, "commitments/finish", Promise(new(2200, 1, 1), null), Promise(new(2199, 12, 31), null)),
        Case(RuleCodes.DateRange, "commitments/finish", Promise(new(1969, 12, 31), null), Promise(new(1970, 1, 1), null)),
        Case(RuleCodes.MoneyNegative, "commitments/budget", Promise(null, -0.01m), Promise(null, 0)),
        Case(FaultCodes.MoneyDecimals, "commitments/budget", Promise(null, 1.005m), Promise(null, 1.050m)),
        Case(FaultCodes.MoneyDecimals, "commitments/budget", s => Promise(null, 1.5m)(s) with { Currency = "JPY" }, s => Promise(null, 1m)(s) with { Currency = "JPY" }),
        Case(RuleCodes.MoneyRange, "commitments/budget", Promise(null, 10_000_000_000_001), Promise(null, 10_000_000_000_000)),
        Case(RuleCodes.CalendarUnknown, "defaultCalendar", s => s with { DefaultCalendar = "six-day" }, s => s with { DefaultCalendar = "every-day" }),
        new(RuleCodes.IdFormat, "/settings/commitments/programmes/a~1b", "programme/a/b",
            Sound.With(s => s with { ProgrammeCommitments = new Dictionary<string, Commitments> { ["a/b"] = new(null, null) } })),
        new(RuleCodes.MoneyNegative, "/settings/commitments/programmes/locks/budget", "programme/locks",
            Sound.With(s => s with { ProgrammeCommitments = new Dictionary<string, Commitments> { ["locks"] = new(null, -5) } })),
    ];

    private static Func<Settings, Settings> Promise(DateOnly? finish, decimal? budget) => s => s with { Commitments = new(finish, budget) };

    private static double[] Levels(int count) => [.. Enumerable.Range(1, count).Select(i => i * 0.5)];

    private static RuleCase Case(string code, string member, Func<Settings, Settings> broken, Func<Settings, Settings>? sound = null) =>
        new(code, "/settings/" + member, SettingsRules.Subject, Sound.With(broken), Sound.With(sound ?? (s => s)));
}
