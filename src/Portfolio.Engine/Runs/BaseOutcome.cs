using Portfolio.Engine.Inputs;

namespace Portfolio.Engine.Runs;

/// <summary>
/// The plan worked through once at the base values (contract section 4, item 9): by project finish (minutes since 1970-01-01) and cost
/// (whole minor units), by milestone finish; <see cref="BlockSamples.Absent"/> for what is not in the base.
/// </summary>
public sealed class BaseOutcome
{
    private BaseOutcome(int projects, int milestones) =>
        (Finish, Cost, MilestoneFinish) = (new int[projects], new double[projects], new int[milestones]);

    /// <summary>[project] in document order.</summary>
    public int[] Finish { get; }

    /// <summary>[project] in document order.</summary>
    public double[] Cost { get; }

    /// <summary>[milestone] in document order.</summary>
    public int[] MilestoneFinish { get; }

    internal static BaseOutcome Of(Plan plan, BaseInputs inputs)
    {
        var milestones = MilestoneInfo.Activities(plan.Network);
        var outcome = new BaseOutcome(plan.Network.Projects.Count, milestones.Length);
        var outcomes = new Outcomes(plan, inputs, 1);
        outcomes.Schedule();
        for (var p = 0; p < outcome.Finish.Length; p++)
        {
            outcomes.Finish(p, outcome.Finish.AsSpan(p, 1));
            outcomes.Cost(p, outcome.Finish.AsSpan(p, 1), outcome.Cost.AsSpan(p, 1));
        }
        for (var m = 0; m < milestones.Length; m++)
            outcomes.MilestoneFinish(milestones[m], outcome.MilestoneFinish.AsSpan(m, 1));
        return outcome;
    }
}
