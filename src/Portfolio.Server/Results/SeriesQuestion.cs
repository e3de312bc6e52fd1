using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Store.Access;

namespace Portfolio.Server.Results;

/// <summary>What a series is asked for, and by whom.</summary>
/// <param name="Metric">One of <see cref="Metrics"/>.</param>
/// <param name="Every">One of <see cref="Intervals"/>.</param>
/// <param name="From">First date; null: from the first point.</param>
/// <param name="To">Last date; null: to the last point.</param>
internal sealed record SeriesQuestion(
    Caller Caller, string Portfolio, Scope Scope, string Metric, Level Level, string Every, DateOnly? From, DateOnly? To)
{
    /// <summary>The metric of the grids that it is read from.</summary>
    public string KeptMetric => Metric == Metrics.Finish ? Metrics.Finish : Metrics.Cost;

    /// <summary>
    /// True when the answer tells of more than single projects (a total, or how the portfolio's is shared out) and the caller may
    /// not see that.
    /// </summary>
    public bool IsHidden => (Scope.IsTotal || Metric == Metrics.Contingency) && !Caller.Holds(Right.Read, Portfolio);
}
