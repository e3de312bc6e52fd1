using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Contracts.Csv;

/// <summary>Series, contingency and distributions as tables: one line for each point, allocation or bin.</summary>
internal static class FigureTables
{
    public static CsvTable Of(SeriesJson series) => new(
        $"series-{series.Metric}",
        ["asOf", "run", "revision", "scope", "metric", "level", "value", "samplingLow", "samplingHigh", "base", "change"],
        series.Points.Select(point => (IReadOnlyList<object?>)
        [
            point.AsOf, point.Run, point.Revision, series.Scope, series.Metric, series.Level,
            Cell(point.Value), Cell(point.SamplingLow), Cell(point.SamplingHigh), Cell(point.Base),
            (object?)point.ChangeDays ?? point.Change,
        ]));

    public static CsvTable Of(ContingencyJson contingency) => new(
        $"contingency-{contingency.AsOf:yyyy-MM-dd}",
        ["run", "asOf", "revision", "level", "project", "base", "allocated", "error", "standalone", "share"],
        contingency.Allocations.Select(line => (IReadOnlyList<object?>)
        [
            contingency.Run, contingency.AsOf, contingency.Revision, contingency.Level,
            line.Project, line.Base, line.Allocated, line.Error, line.Standalone, line.Share,
        ]));

    public static CsvTable Of(OutcomesJson outcomes) => new(
        $"distribution-{outcomes.Metric}-{outcomes.AsOf:yyyy-MM-dd}",
        ["run", "asOf", "revision", "scope", "metric", "from", "to", "count", "share", "cumulative"],
        outcomes.Bins.Select(bin => (IReadOnlyList<object?>)
        [
            outcomes.Run, outcomes.AsOf, outcomes.Revision, outcomes.Scope, outcomes.Metric,
            Cell(bin.From), Cell(bin.To), bin.Count, bin.Share, bin.Cumulative,
        ]));

    private static object? Cell(DateOrMoney? value) => (object?)value?.Date ?? value?.Money;
}
