using System.Text.Json;
using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Results;

namespace Portfolio.Server.Results;

/// <summary>What a series is asked for.</summary>
/// <param name="Metric">One of <see cref="Metrics"/>.</param>
/// <param name="Every">One of <see cref="Intervals"/>.</param>
internal sealed record SeriesQuestion(Scope Scope, string Metric, Level Level, string Every, DateOnly? From, DateOnly? To)
{
    /// <summary>True when the answer tells of more than single projects: a total, or how the portfolio's is shared out.</summary>
    public bool IsOfAll => Scope.IsTotal || Metric == Metrics.Contingency;
}

/// <summary>Series are read from the grids and allocations alone, never from single iterations.</summary>
internal sealed class SeriesReading(ResultStore results, ContingencyReading contingencies, PortfolioFacts facts)
{
    /// <summary>Null when no point of the series, at whatever date, is the caller's to read or has this scope.</summary>
    /// <exception cref="RequestRefused">No run keeps the level.</exception>
    public async Task<SeriesJson?> ReadAsync(Caller caller, string portfolio, SeriesQuestion asked, CancellationToken cancellation)
    {
        var (digits, weekEnds) = await facts.OfAsync(portfolio, revision: null, cancellation);
        var (scope, metric) = (asked.Scope.ToString(), asked.Metric == Metrics.Finish ? Metrics.Finish : Metrics.Cost);
        var points = await results.ListSeriesAsync(caller, portfolio, scope, metric, asked.From, asked.To, cancellation);
        if (points.Count == 0 && (await results.ListSeriesAsync(caller, portfolio, scope, metric, null, null, cancellation)).Count == 0) return null;
        var figures = new List<SeriesPointJson>();
        foreach (var point in Intervals.LastOfEach(points, asked.Every, weekEnds))
            figures.Add(Changed(figures.LastOrDefault(), await FigureAsync(caller, portfolio, point, asked, digits, cancellation)));
        if (!Level.Kept.Contains(asked.Level) && figures.Count > 0 && figures.All(figure => figure.Value is null)) throw NotKept(asked.Level);
        return new() { Scope = scope, Metric = asked.Metric, Level = asked.Level.Percent, Every = asked.Every, Points = figures };
    }

    private static RequestRefused NotKept(Level level)
    {
        var faults = new QueryFaults();
        faults.Add("level", $"No run keeps level {level} for ever: 0.5, 1 to 99, 99.5 and the configured levels make series.");
        return faults.ToException();
    }

    private async Task<SeriesPointJson> FigureAsync(Caller caller, string portfolio, SeriesPoint point, SeriesQuestion asked, int digits, CancellationToken cancellation)
    {
        var grid = GridBytes.FromBytes(point.Grid.Bytes);
        var json = new SeriesPointJson { AsOf = point.AsOf, Run = point.Run, Revision = point.Revision };
        if (asked.Metric == Metrics.Finish) return OfFinish(json, grid, asked.Level);
        if (asked.Metric == Metrics.Cost || asked.Scope.Kind == ScopeKind.Portfolio)
            return OfMoney(json, grid, asked.Level, asked.Metric == Metrics.Cost ? 0 : grid.Base!.Value.Value, digits);
        var contingency = await contingencies.FindAsync(caller, portfolio, point.Run, asked.Level, cancellation);
        return contingency is null ? json : await OfPartAsync(caller, portfolio, json, contingency, asked.Scope, digits, cancellation);
    }

    private static SeriesPointJson OfFinish(SeriesPointJson json, Grid grid, Level level)
    {
        var at = FinishSummary.At(grid, level);
        return json with
        {
            Value = Of(at?.Value),
            SamplingLow = Of(at?.SamplingLow),
            SamplingHigh = Of(at?.SamplingHigh),
            Base = grid.Base is { } known ? new(Instants.ToDate((int)known.Value)) : null,
        };
    }

    /// <summary>Cost at the level, or the portfolio's contingency: the same less the base.</summary>
    private static SeriesPointJson OfMoney(SeriesPointJson json, Grid grid, Level level, long less, int digits)
    {
        var at = grid.At(level);
        return json with
        {
            Value = Of(at?.Value - less, digits),
            SamplingLow = Of(at?.SamplingLow - less, digits),
            SamplingHigh = Of(at?.SamplingHigh - less, digits),
            Base = Of(grid.Base?.Value, digits),
        };
    }

    /// <summary>What is allocated to a project, or to the projects of a programme together; the bounds of a sum of allocations are not known.</summary>
    private async Task<SeriesPointJson> OfPartAsync(
        Caller caller, string portfolio, SeriesPointJson json, Contingency contingency, Scope scope, int digits, CancellationToken cancellation)
    {
        var members = scope.Kind == ScopeKind.Project ? [scope.Project!] : await MembersAsync(caller, portfolio, json.Run, scope, cancellation);
        var lines = contingency.Allocations.Where(line => members.Contains(line.Project, StringComparer.Ordinal)).ToArray();
        var allocated = lines.Sum(line => line.Allocated);
        var error = lines.Length == 1 ? lines[0].Error : null;
        return json with
        {
            Value = Of(allocated, digits),
            SamplingLow = Of(allocated - error, digits),
            SamplingHigh = Of(allocated + error, digits),
            Base = Of(lines.Sum(line => line.Base), digits),
        };
    }

    private async Task<IReadOnlyList<string>> MembersAsync(Caller caller, string portfolio, string run, Scope scope, CancellationToken cancellation) =>
        await results.FindAsync(caller, portfolio, run, scope.ToString(), cancellation) is { } row
            ? JsonSerializer.Deserialize(row.Json, ResultsContext.Plain.ResultJson)!.Projects ?? []
            : [];

    private static SeriesPointJson Changed(SeriesPointJson? before, SeriesPointJson point) => point with
    {
        ChangeDays = point.Value?.Date is { } date && before?.Value?.Date is { } earlier ? date.DayNumber - earlier.DayNumber : null,
        Change = point.Value?.Money - before?.Value?.Money,
    };

    private static DateOrMoney? Of(DateOnly? date) => date is { } known ? new(known) : null;

    private static DateOrMoney? Of(long? minor, int digits) => minor is { } known ? new(MinorUnits.ToMoney(known, digits)) : null;
}
