using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Programmes;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Course;

/// <summary>
/// What was promised at the beginning of the history: the finish of a plan in which everything takes what its planner thinks, some
/// allowance, rounded up to the end of a month; and its cost, some allowance, rounded up to a hundred thousand.
/// </summary>
internal static class Baseline
{
    private const double LeastTime = 0.08;
    private const double MostTime = 0.3;
    private const double LeastMoney = 1.06;
    private const double MostMoney = 1.2;

    public static void Commit(Book book, ActualCourse today)
    {
        var course = today.From((_, _) => 1, (project, activity) => Likely(book, project, activity));
        course.Work(book.FirstWeek.AddYears(9));
        foreach (var id in book.Projects.Select(plan => plan.Id!).ToList())
            book.Change(id, plan => Promise(book, course, plan));
        var byProgramme = book.Projects.GroupBy(plan => plan.Programme!, StringComparer.Ordinal).ToDictionary(
            group => group.Key, group => Together(group.Select(plan => plan.Commitments!)), StringComparer.Ordinal);
        var (finish, budget) = (byProgramme.Values.Max(each => each.Finish), byProgramme.Values.Sum(each => each.Budget));
        book.Settings = book.Settings with
        {
            Commitments = new PortfolioCommitmentsJson { Finish = finish, Budget = budget, Programmes = byProgramme },
        };
    }

    /// <summary>Of an activity in a fork, whether its branch is the likeliest.</summary>
    public static bool Likely(Book book, string project, string activity)
    {
        foreach (var fork in book.Projects.Single(plan => plan.Id == project).ChanceBranches ?? [])
            if (fork.Branches!.SingleOrDefault(branch => branch.Activities!.Contains(activity)) is { } mine)
                return mine == fork.Branches!.MaxBy(branch => branch.Probability);
        return true;
    }

    private static ProjectJson Promise(Book book, ActualCourse course, ProjectJson plan)
    {
        var finish = plan.Activities!.Max(activity => course.Of(plan.Id!, activity.Id!).Finish!.Value);
        return plan with
        {
            Commitments = new CommitmentsJson { Finish = Date(book, plan.Id!, finish), Budget = Money(book, course, plan) },
            Activities =
            [
                .. from activity in plan.Activities!
                   let done = course.Of(plan.Id!, activity.Id!).Finish!.Value
                   select activity.Commitment is null
                       ? activity
                       : activity with { Commitment = Date(book, $"{plan.Id}/{activity.Id}", done) },
            ],
        };
    }

    private static string Date(Book book, string key, DateOnly finish)
    {
        var ahead = Math.Max(finish.DayNumber - book.FirstWeek.DayNumber, 0);
        var promised = finish.AddDays((int)(ahead * Chance.Between($"{key}/time", LeastTime, MostTime)));
        return SharedSettings.Written(new DateOnly(promised.Year, promised.Month, 1).AddMonths(1).AddDays(-1));
    }

    private static decimal Money(Book book, ActualCourse course, ProjectJson plan)
    {
        var work = plan.Activities!.Where(activity => Likely(book, plan.Id!, activity.Id!)).ToList();
        var cost = work.Sum(activity =>
            Estimate.Middle(activity.Cost?.Fixed) + (Estimate.Middle(activity.Cost?.PerDay) * Estimate.Middle(activity.Duration)));
        var first = work.Min(activity => course.Of(plan.Id!, activity.Id!).Start!.Value);
        var last = work.Max(activity => course.Of(plan.Id!, activity.Id!).Finish!.Value);
        cost += plan.Overhead!.PerDay!.Value * book.ProjectDays.Between(first, last);
        return (decimal)Math.Ceiling(cost * Chance.Between($"{plan.Id}/money", LeastMoney, MostMoney) / 100_000) * 100_000;
    }

    private static CommitmentsJson Together(IEnumerable<CommitmentsJson> projects)
    {
        var all = projects.ToList();
        return new CommitmentsJson { Finish = all.Max(each => each.Finish), Budget = all.Sum(each => each.Budget) };
    }
}
