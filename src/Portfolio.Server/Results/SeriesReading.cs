using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>Series are read from the grids and allocations alone, never from single iterations.</summary>
internal sealed class SeriesReading(ResultStore results, ContingencyReading contingencies, ScopeMembers members, PortfolioFacts facts)
{
    /// <summary>Null when no point of the series, at whatever date, is the caller's to read or has this scope.</summary>
    /// <exception cref="RequestRefused">No run keeps the level.</exception>
    public async Task<SeriesJson?> ReadAsync(SeriesQuestion asked, CancellationToken cancellation)
    {
        var points = await PointsAsync(asked, cancellation);
        if (points.Count == 0 && (await PointsAsync(asked with { From = null, To = null }, cancellation)).Count == 0) return null;
        var (digits, weekEnds) = await facts.OfAsync(asked.Portfolio, revision: null, cancellation);
        var figures = new List<SeriesPointJson>();
        foreach (var point in Intervals.LastOfEach(points, asked.Every, weekEnds))
            figures.Add(PointFigures.Changed(figures.LastOrDefault(), await FigureAsync(point, asked, digits, cancellation)));
        if (figures.Count > 0 && figures.All(figure => figure.Value is null) && !Level.Kept.Contains(asked.Level))
            throw NotKept(asked.Level);
        return new()
        {
            Scope = asked.Scope.ToString(),
            Metric = asked.Metric,
            Level = asked.Level.Percent,
            Every = asked.Every,
            Points = figures,
        };
    }

    private Task<IReadOnlyList<SeriesPoint>> PointsAsync(SeriesQuestion asked, CancellationToken cancellation) =>
        results.ListSeriesAsync(
            asked.Caller, asked.Portfolio, asked.Scope.ToString(), asked.KeptMetric, asked.From, asked.To, cancellation);

    private async Task<SeriesPointJson> FigureAsync(SeriesPoint point, SeriesQuestion asked, int digits, CancellationToken cancellation)
    {
        var grid = GridBytes.FromBytes(point.Grid.Bytes);
        var json = new SeriesPointJson { AsOf = point.AsOf, Run = point.Run, Revision = point.Revision };
        if (asked.Metric == Metrics.Finish) return PointFigures.OfFinish(json, grid, asked.Level);
        if (asked.Metric == Metrics.Cost) return PointFigures.OfCost(json, grid, asked.Level, digits);
        if (asked.Scope.Kind == ScopeKind.Portfolio) return PointFigures.OfContingency(json, grid, asked.Level, digits);
        var contingency = await contingencies.FindAsync(asked.Caller, asked.Portfolio, point.Run, asked.Level, cancellation);
        if (contingency is null) return json;
        var parts = await members.OfAsync(asked.Caller, asked.Portfolio, point.Run, asked.Scope, cancellation);
        return PointFigures.OfParts(json, contingency, parts, digits);
    }

    private static RequestRefused NotKept(Level level) =>
        QueryFaults.Of("level", $"No run keeps level {level} for ever: 0.5, 1 to 99, 99.5 and the configured levels make series.");
}
