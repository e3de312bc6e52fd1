using System.Globalization;
using System.Text;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Feeds;

/// <summary>One date to put into a calendar.</summary>
/// <param name="Uid">The same for the same thing in every answer.</param>
internal sealed record CalendarEntry(string Uid, DateOnly Date, string Summary, string Description, string Category);

/// <summary>The entries of one run: for each scope the date of a level, and what was promised.</summary>
internal sealed class CalendarEntries(string portfolio, Level level, ScopeNames names, RunStamp stamp)
{
    /// <param name="rows">With the level as their only percentile.</param>
    /// <param name="warnings">Cautions of the run, as far as the caller may see them.</param>
    public IEnumerable<CalendarEntry> Of(IEnumerable<ResultJson> rows, Func<Scope, IReadOnlyList<WarningJson>> warnings)
    {
        foreach (var row in rows)
        {
            var (scope, finish) = (Scope.Parse(row.Scope)!, row.Finish);
            var cautions = warnings(scope);
            // What happens in no iteration has no date.
            if (finish.Percentiles is [var at, ..])
                yield return Finish(scope, row, at, cautions);
            if (finish.Commitment is { } promise)
                yield return Promise(scope, promise, cautions);
        }
    }

    private CalendarEntry Finish(Scope scope, ResultJson row, DatePercentileJson at, IReadOnlyList<WarningJson> cautions)
    {
        var text = new StringBuilder();
        text.Append(CultureInfo.InvariantCulture, $"Done by this date in {level} % of the iterations.");
        if (row.Happens is { } share)
            text.Append(CultureInfo.InvariantCulture, $" It happens in {Percent(share)} of them; the date is over these.");
        if (at is { SamplingLow: { } low, SamplingHigh: { } high })
            text.Append(CultureInfo.InvariantCulture, $"\n95 % sampling interval: {low:yyyy-MM-dd} to {high:yyyy-MM-dd}.");
        if (row.Finish.Base is { } known)
            text.Append(CultureInfo.InvariantCulture, $"\nBase plan: {known:yyyy-MM-dd}.");
        return new CalendarEntry(
            $"p{level}/{scope}@{portfolio}", at.Value, $"P{level} {names.Of(scope)}", Closed(text, scope, cautions), $"P{level}");
    }

    private CalendarEntry Promise(Scope scope, DateCommitmentJson promise, IReadOnlyList<WarningJson> cautions)
    {
        var chance = promise.Probability is { } probability ? $" ({Percent(probability)})" : "";
        var text = new StringBuilder("The finish that was promised");
        text.Append(promise.Probability is { } kept ? $"; it is kept in {Percent(kept)} of the iterations." : ".");
        return new CalendarEntry(
            $"promised/{scope}@{portfolio}", promise.Date, $"Promised: {names.Of(scope)}{chance}", Closed(text, scope, cautions), "Promised");
    }

    private string Closed(StringBuilder text, Scope scope, IReadOnlyList<WarningJson> cautions)
    {
        text.Append(
            CultureInfo.InvariantCulture,
            $"\nAs of {stamp.AsOf:yyyy-MM-dd}, revision {stamp.Revision}, run {stamp.Run}, {scope}.");
        foreach (var caution in cautions)
            text.Append("\nCaution: ").Append(caution.Message);
        return text.ToString();
    }

    private static string Percent(double probability) => string.Create(CultureInfo.InvariantCulture, $"{100 * probability:0.#} %");
}

/// <summary>What the entries say of their run.</summary>
internal sealed record RunStamp(string Run, DateOnly AsOf, long Revision);
