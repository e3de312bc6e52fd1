using Portfolio.Engine.Calendars;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Pools;

/// <summary>A pool's capacity over time: steps from an instant on, the first from the beginning of time. Immutable.</summary>
internal sealed class SharedPool
{
    public SharedPool(Pool stated, WorkTime scale)
    {
        Id = stated.Id;
        var changes = stated.CapacityChanges.OrderBy(c => c.From).ToArray();
        From = [int.MinValue, .. changes.Select(c => scale.BeginningOf(c.From))];
        Capacity = [stated.Capacity, .. changes.Select(c => c.Capacity)];
    }

    public string Id { get; }

    /// <summary>[step] instant from which the capacity holds.</summary>
    public int[] From { get; }

    /// <summary>[step] units.</summary>
    public double[] Capacity { get; }

    public bool Changes => From.Length > 1;

    /// <summary>The lowest capacity from t to just before <paramref name="end"/>.</summary>
    public double Lowest(int t, int end)
    {
        if (!Changes)
            return Capacity[0];
        var step = From.Length - 1;
        var lowest = double.PositiveInfinity;
        while (From[step] > t)
        {
            if (From[step] < end)
                lowest = Math.Min(lowest, Capacity[step]);
            step--;
        }
        return Math.Min(lowest, Capacity[step]);
    }

    /// <summary>The next instant after t at which capacity changes; <see cref="int.MaxValue"/> when there is none.</summary>
    public int NextChange(int t)
    {
        foreach (var from in From)
        {
            if (from > t)
                return from;
        }
        return int.MaxValue;
    }
}
