using System.Globalization;
using System.Text;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Demo.Start;

/// <summary>
/// The last week as a table for the console: when everything is done, how sure that is, and how it has moved since the week before.
/// </summary>
/// <param name="now">Result rows of the last week, in the order of a run.</param>
/// <param name="before">Those of the week before.</param>
internal sealed class DemoTable(DateOnly asOf, IReadOnlyList<ResultJson> now, IReadOnlyList<ResultJson> before)
{
    private const decimal Median = 50;
    private const decimal Prudent = 80;
    private const string Portfolio = "portfolio";
    private const string ProgrammePrefix = "programme/";

    public string Render()
    {
        var text = new StringBuilder();
        text.AppendLine(Line($"Week to {Date(asOf)}", ["base", "P50", "P80", "promised"], "chance", "P80 moved"));
        Append(text, Portfolio, indent: 0);
        foreach (var programme in now.Where(row => row.Scope.StartsWith(ProgrammePrefix, StringComparison.Ordinal)))
        {
            Append(text, programme.Scope, indent: 1);
            foreach (var project in programme.Projects ?? [])
                Append(text, $"project/{project}", indent: 2);
        }
        return text.AppendLine().Append(CostLine()).AppendLine().ToString();
    }

    private void Append(StringBuilder text, string scope, int indent)
    {
        var finish = Row(now, scope).Finish;
        var name = new string(' ', 2 * indent) + scope[(scope.IndexOf('/') + 1)..];
        var promised = finish.Commitment;
        var moved = Level(finish, Prudent).DayNumber - Level(Row(before, scope).Finish, Prudent).DayNumber;
        string[] dates = [Date(finish.Base), Date(Level(finish, Median)), Date(Level(finish, Prudent)), Date(promised?.Date)];
        text.AppendLine(Line(name, dates, Chance(promised?.Probability), Days(moved)));
    }

    private static string Line(string name, string[] dates, string chance, string moved) =>
        $"{name,-30}  {string.Join("  ", dates.Select(date => date.PadRight(10)))}  {chance,6}  {moved}";

    private string CostLine()
    {
        var cost = Row(now, Portfolio).Cost!;
        var level = cost.Percentiles.Single(at => at.P == Prudent).Value;
        var line = $"Cost at P80: {Millions(level)} million EUR = base {Millions(cost.Base)} + contingency {Millions(level - cost.Base)}.";
        return cost.Commitment is { } promised
            ? $"{line} Budget {Millions(promised.Budget)}, kept with a chance of {Chance(promised.Probability)}."
            : line;
    }

    private static ResultJson Row(IReadOnlyList<ResultJson> rows, string scope) => rows.Single(row => row.Scope == scope);

    private static DateOnly Level(FinishJson finish, decimal level) => finish.Percentiles.Single(at => at.P == level).Value;

    private static string Date(DateOnly? date) => date?.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) ?? "–";

    private static string Chance(double? probability) =>
        probability is { } share ? string.Create(CultureInfo.InvariantCulture, $"{Math.Round(100 * share)} %") : "–";

    private static string Days(int moved) => moved switch
    {
        0 => "unchanged",
        1 or -1 => $"{Signed(moved)} day",
        _ => $"{Signed(moved)} days",
    };

    private static string Signed(int days) => days.ToString("+0;−0", CultureInfo.InvariantCulture);

    private static string Millions(decimal amount) => (amount / 1_000_000).ToString("0.0", CultureInfo.InvariantCulture);
}
