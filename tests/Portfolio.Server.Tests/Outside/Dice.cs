using System.Globalization;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>Seeded choices from which random documents are made; the same seed makes the same document.</summary>
internal sealed class Dice(int seed)
{
    private readonly Random _random = new(seed);

    public bool Chance(double probability) => _random.NextDouble() < probability;

    /// <summary>A whole number from <paramref name="low"/> to <paramref name="high"/>, both possible.</summary>
    public int Whole(int low, int high) => _random.Next(low, high + 1);

    /// <summary>Eighths of a day: sums of these are exact in binary, so that a simulator that counts in days rounds nothing.</summary>
    public double Days(double low, double high) => Whole((int)(low * 8), (int)(high * 8)) / 8.0;

    /// <summary>An amount with so many digits after the point.</summary>
    public double Money(double low, double high, int digits) => Math.Round(low + _random.NextDouble() * (high - low), digits);

    public T Pick<T>(params IReadOnlyList<T> from) => from[_random.Next(from.Count)];

    /// <summary>One of its items; the other would take the array for its only choice.</summary>
    public JsonNode? Pick(JsonArray from) => from[_random.Next(from.Count)];

    /// <summary>So many different ones, in the order in which they stand.</summary>
    public IReadOnlyList<T> Some<T>(IReadOnlyList<T> from, int count)
    {
        var places = Enumerable.Range(0, from.Count).ToArray();
        _random.Shuffle(places);
        return [.. places.Take(count).Order().Select(i => from[i])];
    }

    public void Shuffle<T>(T[] items) => _random.Shuffle(items);

    public static string Date(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    public static JsonArray List(IEnumerable<JsonNode?> items) => [.. items];

    public static JsonArray Texts(IEnumerable<string> items) => [.. items.Select(item => (JsonNode)item)];
}
