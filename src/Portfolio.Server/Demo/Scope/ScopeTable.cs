using System.Globalization;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Demo.Scope;

/// <summary>
/// A scope of work as a table, one activity to a line: <c>id | name | working days | cost | after | with</c>.
/// Days: an <see cref="Estimate"/> or <c>milestone</c>. Cost in thousands: <c>fixed</c>, <c>fixed+perDay</c> or <c>+perDay</c>, a number
/// being a most likely value with the usual range around it, or <c>=600</c> a certain one. After: ids with <c>SS+5</c>, <c>FF+2</c>,
/// <c>FS+3</c> behind them; <c>^</c> is the line above.
/// With: <c>@calendar</c>, <c>~driver</c>, <c>pool*units</c>, <c>!</c> a milestone that is promised.
/// </summary>
internal static class ScopeTable
{
    /// <summary>Stands for a promised date until the baseline is drawn.</summary>
    public const string Promised = "promised";

    /// <param name="days">Factor on the durations.</param>
    /// <param name="cost">Factor on the costs.</param>
    public static IReadOnlyList<ActivityJson> Read(string table, double days = 1, double cost = 1)
    {
        var rows = new List<ActivityJson>();
        foreach (var line in table.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries))
            rows.Add(Row([.. line.Split('|', StringSplitOptions.TrimEntries), "", "", ""], rows.LastOrDefault()?.Id, days, cost));
        return rows;
    }

    private static ActivityJson Row(string[] cells, string? above, double days, double cost)
    {
        var marks = cells[5].Split(' ', StringSplitOptions.RemoveEmptyEntries);
        var milestone = cells[2] == "milestone";
        return new ActivityJson
        {
            Id = cells[0],
            Name = cells[1],
            Milestone = milestone ? true : null,
            Commitment = marks.Contains("!") ? Promised : null,
            Duration = milestone ? null : Estimate.Scaled(Estimate.Read(cells[2]), days, digits: 1),
            Cost = milestone || cells[3].Length == 0 ? null : Cost(cells[3], cost),
            Predecessors = Some(cells[4].Split(',', StringSplitOptions.RemoveEmptyEntries).Select(text => Link(text, above))),
            Demands = Some(marks.Where(mark => mark.Contains('*', StringComparison.Ordinal)).Select(Demand)),
            Drivers = Some(marks.Where(mark => mark[0] == '~').Select(mark => mark[1..])),
            Calendar = marks.Where(mark => mark[0] == '@').Select(mark => mark[1..]).SingleOrDefault(),
        };
    }

    private static ActivityCostJson Cost(string text, double factor)
    {
        var parts = text.Split('+', StringSplitOptions.TrimEntries);
        return new ActivityCostJson
        {
            Fixed = parts[0].Length == 0 ? null : Thousands(parts[0], factor, low: 0.92, high: 1.28),
            PerDay = parts.Length == 1 ? null : Thousands(parts[1], factor, low: 0.95, high: 1.15),
        };
    }

    private static DistributionJson Thousands(string text, double factor, double low, double high)
    {
        if (text[0] == '=')
            return Estimate.Certain(Number(text[1..]) * 1000);
        if (text.Contains(' ', StringComparison.Ordinal))
            return Estimate.Scaled(Estimate.Read(text), 1000 * factor, digits: 0);
        var likely = Number(text) * 1000 * factor;
        return Estimate.Pert(Math.Round(likely * low), Math.Round(likely), Math.Round(likely * high));
    }

    public static LinkJson Link(string text, string? above = null)
    {
        var words = text.Split(' ', StringSplitOptions.RemoveEmptyEntries);
        var activity = words[0] == "^" ? above : words[0];
        return words.Length == 1
            ? new LinkJson { Activity = activity }
            : new LinkJson { Activity = activity, Type = words[1][..2], Lag = words[1].Length > 2 ? Number(words[1][2..]) : null };
    }

    private static DemandJson Demand(string mark) =>
        mark.Split('*') is [var pool, var units] ? new DemandJson { Pool = pool, Units = Number(units) } : throw new FormatException(mark);

    private static List<T>? Some<T>(IEnumerable<T> items) => items.ToList() is { Count: > 0 } list ? list : null;

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}
