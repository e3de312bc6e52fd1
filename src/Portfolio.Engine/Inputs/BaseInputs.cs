using Portfolio.Engine.Calendars;
using Portfolio.Engine.Networks;

namespace Portfolio.Engine.Inputs;

/// <summary>
/// One iteration at the base values: no drivers, no events, the likeliest branches, the cost of responses taken (contract section 4, item
/// 9).
/// </summary>
internal sealed class BaseInputs(Network network, EstimateSet estimates, EventSet events, ForkSet forks) : ChunkInputs
{
    public override int Count => 1;

    public override ReadOnlySpan<int> Picks(int fork) => forks.Base.AsSpan(fork, 1);

    public override void Durations(int activity, Span<int> minutes) => minutes[0] = InBase(activity) ? estimates.BaseMinutes[activity] : 0;

    public override void AddCosts(int activity, ReadOnlySpan<int> minutes, Span<double> cost)
    {
        if (InBase(activity))
            cost[0] += (estimates.Fixed[activity]?.Base ?? 0) + (estimates.Rate[activity]?.Base ?? 0) * Minutes.Days(minutes[0]);
    }

    public override void AddEventCosts(int project, Span<double> cost) => cost[0] += events.ResponseCost[project];

    /// <summary>False for activities of branches that the base does not take.</summary>
    public bool InBase(int activity) => network.Fork[activity] < 0 || forks.Base[network.Fork[activity]] == network.Branch[activity];
}
