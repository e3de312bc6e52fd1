using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Http;

namespace Portfolio.Server.Results;

/// <summary>A scope in a query.</summary>
internal static class ScopeParameter
{
    public static Scope Read(QueryFaults faults, string? text)
    {
        if (text is null) return Scope.Portfolio;
        if (Scope.Parse(text) is { } scope) return scope;
        faults.Add("scope", "'scope' must be portfolio, programme/p, project/p or milestone/p/a.");
        return Scope.Portfolio;
    }

    public static void MustCost(QueryFaults faults, Scope scope)
    {
        if (scope.Kind == ScopeKind.Milestone) faults.Add("metric", "A milestone has no cost: its 'metric' can only be finish.");
    }
}

/// <summary>The width of the bins of a finish in a query.</summary>
internal static class DateBins
{
    public const DateBin Usual = DateBin.Week;

    public static DateBin Read(QueryFaults faults, string? text) => faults.Word("bin", text, "week", ["day", "week", "month"]) switch
    {
        "day" => DateBin.Day,
        "month" => DateBin.Month,
        _ => DateBin.Week,
    };
}
