using Portfolio.Model.Documents;

namespace Portfolio.Model.Rules;

/// <summary>What a project may refer to in the settings: all that is needed to check one project on its own. Immutable.</summary>
public sealed class PortfolioContext
{
    private readonly HashSet<string> calendars;
    private readonly HashSet<string> drivers;
    private readonly Dictionary<string, double> lastCapacity = new(StringComparer.Ordinal);

    private PortfolioContext(Settings settings, ModelLimits limits)
    {
        Limits = limits;
        MinorDigits = DigitsOf(settings.Currency);
        calendars = CalendarIds(settings);
        drivers = settings.Drivers.Select(d => d.Id).Where(id => id is not null).ToHashSet(StringComparer.Ordinal);
        foreach (var pool in settings.Pools.Where(p => p.Id is not null)) lastCapacity.TryAdd(pool.Id, LastCapacity(pool));
    }

    public ModelLimits Limits { get; }

    /// <summary>Decimals that money may have.</summary>
    public int MinorDigits { get; }

    /// <param name="settings">May break rules itself; nothing is reported twice because of that.</param>
    /// <param name="limits">Null: <see cref="ModelLimits.Default"/>.</param>
    public static PortfolioContext Of(Settings settings, ModelLimits? limits = null) => new(settings, limits ?? ModelLimits.Default);

    public bool HasCalendar(string id) => calendars.Contains(id);

    public bool HasDriver(string id) => drivers.Contains(id);

    /// <summary>Units of the pool from its last change on; null when there is no such pool, NaN when its capacity is at fault.</summary>
    public double? LastCapacity(string pool) => lastCapacity.TryGetValue(pool, out var capacity) ? capacity : null;

    internal static HashSet<string> CalendarIds(Settings settings) =>
        settings.Calendars.Select(c => c.Id).Where(id => id is not null).Append(WorkCalendar.EveryDayId).ToHashSet(StringComparer.Ordinal);

    /// <summary>Digits of the minor unit; of an unknown currency as many as a decimal has, so that only the currency is reported.</summary>
    internal static int DigitsOf(string? currency) =>
        currency is not null && Currencies.Exists(currency) ? Money.MinorDigits(currency) : 28;

    private static double LastCapacity(Pool pool)
    {
        var last = pool.CapacityChanges.Count == 0 ? pool.Capacity : pool.CapacityChanges.MaxBy(c => c.From).Capacity;
        return last >= 0 ? last : double.NaN;
    }
}
