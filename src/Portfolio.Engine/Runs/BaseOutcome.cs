using Portfolio.Engine.Inputs;

namespace Portfolio.Engine.Runs;

/// <summary>
/// The plan worked through once at the base values (contract section 4, item 9): by project finish (minutes since 1970-01-01) and cost
/// (whole minor units), by milestone finish; <see cref="BlockSamples.Absent"/> for what is not in the base.
/// </summary>
public sealed class BaseOutcome
{
    private BaseOutcome(BlockSamples samples)
    {
        Finish = [.. samples.Finish.Select(row => row[0])];
        Cost = [.. samples.Cost.Select(row => row[0])];
        MilestoneFinish = [.. samples.MilestoneFinish.Select(row => row[0])];
    }

    /// <summary>[project] in document order.</summary>
    public int[] Finish { get; }

    /// <summary>[project] in document order.</summary>
    public double[] Cost { get; }

    /// <summary>[milestone] in document order.</summary>
    public int[] MilestoneFinish { get; }

    internal static BaseOutcome Of(Plan plan, BaseInputs inputs)
    {
        var samples = new BlockSamples(0, 1, plan.Network.Projects.Count, MilestoneInfo.Activities(plan.Network).Length);
        new Outcomes(plan, inputs, 1).Work(samples, 0);
        return new BaseOutcome(samples);
    }
}
