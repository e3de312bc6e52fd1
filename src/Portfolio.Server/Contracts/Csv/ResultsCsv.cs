using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Contracts.Csv;

/// <summary>Results as a table: one line for each scope and level.</summary>
internal static class ResultsCsv
{
    private static readonly string[] Header =
    [
        "scope", "run", "asOf", "revision", "happens", "level",
        "finish", "finishLow", "finishHigh", "cost", "costLow", "costHigh",
        "finishBase", "finishBaseProbability", "finishMean", "finishSdDays", "finishCommitment", "finishCommitmentProbability",
        "costBase", "costBaseProbability", "costMean", "costSd", "budget", "budgetProbability", "jointProbability",
    ];

    public static CsvTable Of(string name, IEnumerable<ResultJson> rows) => new(name, Header, rows.SelectMany(Lines));

    private static IEnumerable<IReadOnlyList<object?>> Lines(ResultJson row)
    {
        var dates = row.Finish.Percentiles;
        var amounts = row.Cost?.Percentiles ?? [];
        // A milestone that never happens has no level, but still a line.
        for (var i = 0; i < Math.Max(1, Math.Max(dates.Count, amounts.Count)); i++)
            yield return Line(row, i < dates.Count ? dates[i] : null, i < amounts.Count ? amounts[i] : null);
    }

    private static object?[] Line(ResultJson row, DatePercentileJson? date, MoneyPercentileJson? amount) =>
    [
        row.Scope, row.Run, row.AsOf, row.Revision, row.Happens, date?.P ?? amount?.P,
        date?.Value, date?.SamplingLow, date?.SamplingHigh, amount?.Value, amount?.SamplingLow, amount?.SamplingHigh,
        row.Finish.Base, row.Finish.BaseProbability, row.Finish.Mean, row.Finish.SdDays,
        row.Finish.Commitment?.Date, row.Finish.Commitment?.Probability,
        row.Cost?.Base, row.Cost?.BaseProbability, row.Cost?.Mean, row.Cost?.Sd,
        row.Cost?.Commitment?.Budget, row.Cost?.Commitment?.Probability,
        row.Joint?.Probability,
    ];
}
