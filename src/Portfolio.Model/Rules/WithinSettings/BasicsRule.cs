using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinSettings;

/// <summary>Name, currency, zone, fiscal year, confidence levels, seed and iterations.</summary>
internal static class BasicsRule
{
    // A leap day starts a fiscal year only every fourth year.
    private static readonly int[] DaysInMonth = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];

    public static IEnumerable<Fault> Check(Settings settings, Place at, ModelLimits limits)
    {
        if (TextRule.Name(settings.Name, "name", () => at.Under("name")) is { } name) yield return name;
        if (settings.Currency is { Length: > 0 } currency && !Currencies.Exists(currency))
            yield return at.Under("currency").Fault(
                RuleCodes.CurrencyUnknown, $"\"{TextRule.Shown(currency)}\" is not an ISO 4217 currency code such as EUR, in "
                + "capitals and with a minor unit.");
        if (settings.TimeZone is { } zone && !IsZone(zone))
            yield return at.Under("timeZone").Fault(
                RuleCodes.TimeZoneUnknown, $"\"{TextRule.Shown(zone)}\" is not an IANA time zone such as Europe/Lisbon or UTC.");
        if (settings.FiscalYearStart is var start && !IsDayOfEveryYear(start))
            yield return at.Under("fiscalYearStart").Fault(
                RuleCodes.FiscalYearStart, $"{start.Month:00}-{start.Day:00} is not a day of every year, so no fiscal year can "
                + "start on it.");
        foreach (var fault in Confidence(settings.Confidence, at, limits)) yield return fault;
        if (settings.Seed is < 0 or > Bounds.Seed)
            yield return at.Under("seed").Fault(RuleCodes.SeedRange,
                $"The seed must be a whole number from 0 to {Bounds.Seed}.");
        if (settings.Iterations < limits.MinIterations || settings.Iterations > limits.MaxIterations)
            yield return at.Under("iterations").Fault(
                RuleCodes.IterationsRange, $"The number of iterations must be from {limits.MinIterations} to {limits.MaxIterations}.");
    }

    private static IEnumerable<Fault> Confidence(IReadOnlyList<double> levels, Place at, ModelLimits limits)
    {
        if (levels.Count > limits.Levels)
            yield return at.Under("confidence").Fault(
                RuleCodes.LimitExceeded, $"There are {levels.Count} confidence levels; at most {limits.Levels} are allowed.");
        var seen = new HashSet<double>();
        for (var i = 0; i < levels.Count; i++)
        {
            if (ValueRule.Finite(levels[i], () => at.Under("confidence", i)) is { } notFinite) yield return notFinite;
            else if (levels[i] is not (> 0 and < 100))
                yield return at.Under("confidence", i).Fault(
                    RuleCodes.ConfidenceRange, $"The confidence level is {levels[i]}; it must be above 0 and below 100.");
            else if (!seen.Add(levels[i]))
                yield return at.Under("confidence", i).Fault(RuleCodes.ConfidenceRepeated,
                    $"The confidence level {levels[i]} is listed twice.");
        }
    }

    private static bool IsDayOfEveryYear(MonthDay day) =>
        day.Month is >= 1 and <= 12 && day.Day >= 1 && day.Day <= DaysInMonth[day.Month - 1];

    // The zone database also holds the machine's own zone and whole copies of itself under other names; these are no IANA names.
    private static bool IsZone(string zone) =>
        zone.Length > 0
        && zone is not ("localtime" or "posixrules" or "Factory")
        && !zone.StartsWith("posix/", StringComparison.Ordinal)
        && !zone.StartsWith("right/", StringComparison.Ordinal)
        && TimeZoneInfo.TryFindSystemTimeZoneById(zone, out _);
}
