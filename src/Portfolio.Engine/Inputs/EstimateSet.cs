using Portfolio.Engine.Calendars;
using Portfolio.Engine.Dependence;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Inputs;

/// <summary>The estimates of every activity, by activity index; null where nothing is stated or nothing is left to do.</summary>
internal sealed class EstimateSet
{
    public required Estimate?[] Duration { get; init; }

    public required Estimate?[] Fixed { get; init; }

    public required Estimate?[] Rate { get; init; }

    /// <summary>[activity] indices of the drivers that act on its work, each once.</summary>
    public required int[][] DurationDrivers { get; init; }

    /// <summary>[activity] indices of the drivers that act on its costs, each once.</summary>
    public required int[][] CostDrivers { get; init; }

    /// <summary>[project] √r, the weight of the project's factor in its estimates' scores.</summary>
    public required double[] Loading { get; init; }

    /// <summary>[project] √(1−r).</summary>
    public required double[] Own { get; init; }

    /// <summary>[activity] base length, minutes, whether or not it is in the base.</summary>
    public required int[] BaseMinutes { get; init; }

    public static EstimateSet Build(Network network, Settings settings, Func<string, bool>? held)
    {
        var n = network.Count;
        var set = new EstimateSet
        {
            Duration = new Estimate?[n],
            Fixed = new Estimate?[n],
            Rate = new Estimate?[n],
            DurationDrivers = new int[n][],
            CostDrivers = new int[n][],
            Loading = [.. network.Projects.Select(p => Math.Sqrt(RankCorrelation.ToNormal(p.Correlation ?? 0)))],
            Own = [.. network.Projects.Select(p => Math.Sqrt(1 - RankCorrelation.ToNormal(p.Correlation ?? 0)))],
            BaseMinutes = new int[n],
        };
        var driverIndex = settings.Drivers.Select((d, i) => (d.Id, i)).ToDictionary(x => x.Id, x => x.i, StringComparer.Ordinal);
        for (var a = 0; a < n; a++)
        {
            var activity = network.Activities[a];
            var project = network.Projects[network.ProjectOf[a]];
            (set.DurationDrivers[a], set.CostDrivers[a]) = ([], []);
            if (activity.Finished)
                continue;
            var key = $"project/{project.Id}/activity/{activity.Id}/";
            if (!activity.Milestone)
                set.Duration[a] = Estimate.Of(activity.UnderWay ? activity.Remaining : activity.Duration, key + "duration", held);
            set.Fixed[a] = Estimate.Of(activity.Cost?.Fixed, key + "fixed", held);
            set.Rate[a] = Estimate.Of(activity.Cost?.PerDay, key + "perDay", held);
            var drivers = project.Drivers.Concat(activity.Drivers).Distinct(StringComparer.Ordinal).Select(d => driverIndex[d]).ToArray();
            set.DurationDrivers[a] = [.. drivers.Where(d => settings.Drivers[d].DurationFactor is not null)];
            set.CostDrivers[a] = [.. drivers.Where(d => settings.Drivers[d].CostFactor is not null)];
            set.BaseMinutes[a] = Minutes.OfWork(set.Duration[a]?.Base ?? 0);
        }
        return set;
    }
}
