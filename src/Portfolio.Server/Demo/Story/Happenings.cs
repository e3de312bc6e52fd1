using System.Globalization;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Demo.Course;
using Portfolio.Server.Demo.Programmes;
using Portfolio.Server.Demo.Scope;

namespace Portfolio.Server.Demo.Story;

/// <summary>One thing that happens in a week and what it changes in the book.</summary>
internal delegate void Happening(Book book);

/// <summary>The kinds of things that happen.</summary>
internal static class Happenings
{
    /// <summary>Work turns out to need more days than estimated (fewer: negative).</summary>
    public static Happening Slip(string project, string activity, double days) => book => book.AddHold(project, activity, days);

    public static Happening Reestimate(string project, string activity, string duration) => book =>
        book.Change(project, activity, each => each with { Duration = Estimate.Read(duration) });

    public static Happening Reprice(string project, string activity, double factor) => book => book.Change(
        project, activity,
        each => each with { Cost = each.Cost! with { Fixed = Estimate.Scaled(each.Cost.Fixed!, factor, digits: 0) } });

    /// <summary>A risk has come true: what it was thought to do becomes part of the plan and it leaves the register.</summary>
    public static Happening Occurs(string project, string risk) => book =>
    {
        var occurred = book.Projects.Single(plan => plan.Id == project).RiskEvents!.Single(each => each.Id == risk);
        foreach (var impact in occurred.Impacts!)
        {
            book.AddHold(project, impact.Activity!, Estimate.Middle(impact.Delay));
            book.Change(project, impact.Activity!, each => each with { Cost = Dearer(each.Cost, impact.Cost) });
        }
        Closes(project, risk)(book);
    };

    /// <summary>A risk can no longer come true.</summary>
    public static Happening Closes(string project, string risk) => book =>
        book.Change(project, plan => plan with { RiskEvents = [.. plan.RiskEvents!.Where(each => each.Id != risk)] });

    public static Happening Identified(string project, RiskEventJson risk) => book =>
        book.Change(project, plan => plan with { RiskEvents = [.. plan.RiskEvents!, risk] });

    /// <summary>The office decides to do something about a risk.</summary>
    public static Happening Takes(string project, string risk, string response) => book =>
        book.Change(project, plan => plan with
        {
            RiskEvents = [.. plan.RiskEvents!.Select(each => each.Id == risk ? Taken(each, response) : each)],
        });

    /// <summary>Work is added (a <see cref="ScopeTable"/>) before an activity that then also waits for it.</summary>
    public static Happening Adds(string project, string before, string table) => book =>
    {
        var added = ScopeTable.Read(table);
        book.Change(project, plan => plan with
        {
            Activities = [.. plan.Activities!.SelectMany(each => each.Id == before ? [.. added, each] : new[] { each })],
        });
        Links(project, before, added[^1].Id!)(book);
    };

    /// <summary>An activity has to wait for another one, perhaps of another project.</summary>
    public static Happening Links(string project, string activity, string predecessor) => book =>
        book.Change(project, activity, each => each with { Predecessors = [.. each.Predecessors ?? [], ScopeTable.Link(predecessor)] });

    /// <summary>A pool has another capacity from the Monday after a week on.</summary>
    public static Happening Capacity(string pool, int afterWeek, double capacity) => book =>
    {
        var change = new CapacityChangeJson { From = SharedSettings.Written(book.WeekEnd(afterWeek).AddDays(1)), Capacity = capacity };
        book.Settings = book.Settings with
        {
            Pools =
            [
                .. from each in book.Settings.Pools!
                   select each.Id == pool ? each with { CapacityChanges = After(each.CapacityChanges, change) } : each,
            ],
        };
    };

    /// <summary>A project's promise is renewed.</summary>
    public static Happening Rebaselines(string project, int weeks, decimal budget) => book =>
    {
        book.Change(project, plan => plan with
        {
            Commitments = new CommitmentsJson
            {
                Finish = Later(plan.Commitments!.Finish!, weeks),
                Budget = plan.Commitments.Budget + budget,
            },
        });
        var promised = book.Settings.Commitments!;
        var programme = book.Projects.Single(plan => plan.Id == project).Programme!;
        var old = promised.Programmes![programme];
        var renewed = old with
        {
            Finish = book.Projects.Where(plan => plan.Programme == programme).Max(plan => plan.Commitments!.Finish),
            Budget = old.Budget + budget,
        };
        Dictionary<string, CommitmentsJson> programmes = new(promised.Programmes, StringComparer.Ordinal) { [programme] = renewed };
        book.Settings = book.Settings with
        {
            Commitments = promised with
            {
                Finish = programmes.Values.Max(each => each.Finish),
                Budget = promised.Budget + budget,
                Programmes = programmes,
            },
        };
    };

    /// <summary>It is known now which way a fork goes: the other ways leave the plan.</summary>
    public static Happening Resolves(string project, string fork, string branch) => book => book.Change(project, plan =>
    {
        var gone = plan.ChanceBranches!.Single(each => each.Id == fork).Branches!
            .Where(each => each.Id != branch).SelectMany(each => each.Activities!).ToHashSet(StringComparer.Ordinal);
        var left = plan.ChanceBranches!.Where(each => each.Id != fork).ToList();
        return plan with
        {
            ChanceBranches = left.Count == 0 ? null : left,
            Activities =
            [
                .. plan.Activities!.Where(each => !gone.Contains(each.Id!)).Select(each => each with
                {
                    Predecessors = each.Predecessors is null ? null : [.. each.Predecessors.Where(link => !gone.Contains(link.Activity!))],
                }),
            ],
        };
    });

    private static ActivityCostJson Dearer(ActivityCostJson? cost, DistributionJson? by)
    {
        var extra = Estimate.Middle(by);
        return cost?.Fixed is null
            ? (cost ?? new ActivityCostJson()) with { Fixed = by }
            : cost with { Fixed = Estimate.Shifted(cost.Fixed, extra) };
    }

    private static RiskEventJson Taken(RiskEventJson risk, string response) =>
        risk with { Responses = [.. risk.Responses!.Select(each => each with { Taken = each.Id == response ? true : null })] };

    private static List<CapacityChangeJson> After(IReadOnlyList<CapacityChangeJson>? changes, CapacityChangeJson added) =>
        [.. (changes ?? []).Where(each => string.CompareOrdinal(each.From, added.From) < 0), added];

    private static string Later(string date, int weeks) =>
        SharedSettings.Written(DateOnly.ParseExact(date, "yyyy-MM-dd", CultureInfo.InvariantCulture).AddDays(7 * weeks));
}
