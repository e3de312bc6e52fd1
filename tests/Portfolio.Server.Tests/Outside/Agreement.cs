using System.Text;
using Portfolio.Engine;
using Portfolio.Engine.Results;
using Portfolio.Engine.Runs;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// Compares two simulations of one document whose draws have nothing in common. The error of a percentile is taken from order statistics:
/// it reaches to the values four standard errors of the rank away, √(n·p·(1−p)), on the side of the other simulation, and the errors of
/// the two add as squares.
/// </summary>
internal static class Agreement
{
    private const double Width = 4; // standard errors

    /// <summary>
    /// Every figure further apart than four standard errors of the difference; finishes, which move in whole days, and one day.
    /// </summary>
    public static string Differences(Plan plan, Samples samples, OracleAnswer<OracleFigures> outside)
    {
        var found = new StringBuilder();
        foreach (var (scope, finish, cost) in Series(plan, samples))
        {
            if (!outside.Scopes.TryGetValue(scope, out var theirs))
                continue;
            Compare($"{scope} finish (days)", [.. finish.Select(t => Days(t) - outside.Epoch)], theirs.Finish, 1, found);
            if (theirs.Cost is not null)
                Compare($"{scope} cost", [.. cost.Select(minor => minor / plan.MinorPerUnit)], theirs.Cost, 1 / plan.MinorPerUnit, found);
        }
        return found.ToString();
    }

    /// <summary>
    /// Finish and cost of projects, programmes and the portfolio; finishes of milestones in the iterations in which they happen.
    /// </summary>
    private static IEnumerable<(string Scope, IEnumerable<int> Finish, IEnumerable<double> Cost)> Series(Plan plan, Samples samples)
    {
        var projects = plan.Document.Projects;
        var present = Enumerable.Range(0, projects.Count).Where(p => projects[p].Activities.Count > 0).ToList();
        foreach (var p in present)
            yield return ($"project/{projects[p].Id}", samples.Finish[p], samples.Cost[p]);
        foreach (var programme in present.Where(p => projects[p].Programme is not null).GroupBy(p => projects[p].Programme))
            yield return ($"programme/{programme.Key}", Latest(samples, [.. programme]), Total(samples, [.. programme]));
        yield return ("portfolio", Latest(samples, present), Total(samples, present));
        for (var m = 0; m < plan.Milestones.Count; m++)
        {
            var scope = $"milestone/{projects[plan.Milestones[m].Project].Id}/{plan.Milestones[m].Activity.Id}";
            yield return (scope, samples.Milestone[m].Where(t => t != BlockSamples.Absent), []);
        }
    }

    private static IEnumerable<int> Latest(Samples samples, List<int> projects) =>
        Enumerable.Range(0, samples.Finish[0].Length).Select(k => projects.Max(p => samples.Finish[p][k]));

    private static IEnumerable<double> Total(Samples samples, List<int> projects) =>
        Enumerable.Range(0, samples.Cost[0].Length).Select(k => projects.Sum(p => samples.Cost[p][k]));

    private static void Compare(string name, double[] ours, OracleSeries theirs, double step, StringBuilder found)
    {
        Array.Sort(ours);
        var meanError = Width * theirs.Sd * Math.Sqrt(1.0 / ours.Length + 1.0 / theirs.Count) + step / 2;
        if (Math.Abs(ours.Average() - theirs.Mean) > meanError)
            found.AppendLine($"{name}: mean {ours.Average():F4}, outside {theirs.Mean:F4} ± {meanError:F4}");
        foreach (var level in theirs.Levels)
        {
            var (value, low, high) = Percentile(ours, level.Level);
            var error = value > level.Value ? Both(value - low, level.High - level.Value) : Both(high - value, level.Value - level.Low);
            if (Math.Abs(value - level.Value) > error + step)
                found.AppendLine($"{name}: P{level.Level} {value:F4}, outside {level.Value:F4} ± {error:F4}");
        }
    }

    private static double Days(int instant) => instant / (double)Instants.MinutesPerDay;

    private static double Both(double ours, double theirs) => Math.Sqrt(ours * ours + theirs * theirs);

    private static (double Value, double Low, double High) Percentile(double[] sorted, double level)
    {
        var n = sorted.Length;
        var rank = Math.Ceiling(level * n / 100 - 1e-9);
        var reach = Width * Math.Sqrt(n * level / 100 * (1 - level / 100));
        return (At(rank), At(Math.Floor(rank - reach)), At(Math.Ceiling(rank + reach)));

        double At(double place) => sorted[(int)Math.Clamp(place, 1, n) - 1];
    }
}
