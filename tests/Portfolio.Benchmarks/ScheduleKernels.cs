using Portfolio.Engine;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;

namespace Portfolio.Benchmarks;

/// <summary>The steps of an iteration: drawing the work of an activity, placing it, dispatching it.</summary>
internal static class ScheduleKernels
{
    private const int Chunk = 1024, PoolChunk = 64;

    public static void Print(Action<string, double> line)
    {
        var plan = Plan.Compile(InventedPortfolio.Of(20, 250));
        var inputs = Inputs(plan, Chunk);
        var rows = new ScheduleRows(RowLayout.Full(plan.Network.Count), Chunk);
        var pass = new ForwardPass(plan.Network, rows, inputs);
        var steps = (long)plan.Network.Count * Chunk;
        line("duration of an activity: drawn, driver, minutes", Timing.Nanoseconds(steps, () => Draw(plan.Network.Order, inputs, rows)));
        line("forward-pass step", Timing.Nanoseconds(steps, () => Array.ForEach(plan.Network.Order, pass.Place)));
        line("dispatch event: start or end of one activity", DispatchEvent());
    }

    private static double DispatchEvent()
    {
        var plan = Plan.Compile(InventedPortfolio.Of(20, 250, pools: 4));
        var inputs = Inputs(plan, PoolChunk);
        var rows = new ScheduleRows(RowLayout.Full(plan.Network.Count), PoolChunk);
        var pass = new ForwardPass(plan.Network, rows, inputs);
        var dispatcher = new PassingDispatcher(plan.Pools!, pass, rows);
        Draw(plan.Stages.First, inputs, rows);
        // The dispatcher writes over the earliest starts it reads, so they are made ready again each time, outside the measure.
        var seconds = Timing.Median(() =>
        {
            foreach (var activity in plan.Stages.First)
            {
                if (plan.Stages.IsDispatched(activity))
                    pass.EarliestStarts(activity, rows.Start(activity, PoolChunk), plan.Stages);
                else
                    pass.Place(activity);
            }
            return Timing.Cpu(() => dispatcher.Run(PoolChunk));
        });
        return seconds / (2L * plan.Stages.Dispatched.Length * PoolChunk) * 1e9;
    }

    private static DrawnInputs Inputs(Plan plan, int chunk)
    {
        var inputs = new DrawnInputs(plan.Network, plan.Estimates, plan.Events, plan.Forks, plan.Dependence, plan.Drivers, chunk);
        inputs.Begin(1, 0, chunk);
        return inputs;
    }

    private static void Draw(int[] activities, DrawnInputs inputs, ScheduleRows rows)
    {
        foreach (var activity in activities)
            inputs.Durations(activity, rows.Work(activity, rows.Capacity));
    }
}
