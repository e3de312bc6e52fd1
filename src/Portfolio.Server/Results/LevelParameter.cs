using System.Globalization;
using Portfolio.Engine.Results;
using Portfolio.Server.Http;

namespace Portfolio.Server.Results;

/// <summary>Confidence levels in a query: percentages above 0 and below 100 with at most six decimals.</summary>
internal static class LevelParameter
{
    public static readonly Level Usual = Level.Of(80);

    public static Level One(QueryFaults faults, string parameter, string? text)
    {
        if (text is null) return Usual;
        if (TryRead(text, out var level)) return level;
        faults.Add(parameter, $"'{parameter}' must be a level above 0 and below 100 with at most six decimals.");
        return Usual;
    }

    /// <summary>Several, parted by commas, each once, in the order in which they were given; none when the parameter is left out.</summary>
    public static IReadOnlyList<Level> Several(QueryFaults faults, string parameter, string? text, int most)
    {
        if (text is null) return [];
        var words = text.Split(',');
        if (words.Length > most)
        {
            faults.Add(parameter, $"'{parameter}' may name {most} levels at most.");
            return [];
        }
        var levels = words.Select(word => TryRead(word, out var level) ? level : (Level?)null).ToArray();
        if (levels.All(level => level is not null)) return [.. levels.Select(level => level!.Value).Distinct()];
        faults.Add(parameter, $"'{parameter}' must be levels above 0 and below 100 with at most six decimals, parted by commas.");
        return [];
    }

    private static bool TryRead(string text, out Level level)
    {
        level = default;
        return decimal.TryParse(text, NumberStyles.AllowDecimalPoint, CultureInfo.InvariantCulture, out var percent)
            && Level.TryOf(percent, out level);
    }
}
