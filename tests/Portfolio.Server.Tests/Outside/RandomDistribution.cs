using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// All eight types of distribution, and the plain number, around a middle value. Base values of durations fall on eighths of a day: modes,
/// means and middles do, and the lognormals are chosen so that their medians do.
/// </summary>
internal static class RandomDistribution
{
    /// <summary>Working days; <paramref name="middle"/> a multiple of an eighth, above 0.</summary>
    public static JsonNode Days(Dice dice, double middle) => Around(dice, middle, digits: 3);

    /// <summary>Money, of a size around the middle.</summary>
    public static JsonNode Money(Dice dice, double middle, int digits) => Around(dice, dice.Money(middle * 0.5, middle * 1.5, digits), digits);

    /// <summary>A factor of a driver, around 1.</summary>
    public static JsonNode Factor(Dice dice) => dice.Whole(0, 3) switch
    {
        0 => Triangular(0.9, 1, dice.Pick(1.25, 1.5)),
        1 => Of("pert", ("low", 0.9), ("mode", 1.05), ("high", 1.6)),
        2 => Of("uniform", ("low", 1), ("high", 1.5)),
        _ => Of("normal", ("mean", 1.1), ("sd", 0.1), ("min", 0.8)),
    };

    private static JsonNode Around(Dice dice, double middle, int digits)
    {
        double At(double factor) => Math.Round(middle * factor, digits);
        return dice.Whole(0, 12) switch
        {
            0 => middle,
            1 => Of("constant", ("value", middle)),
            2 => Of("uniform", ("low", middle - At(0.25)), ("high", middle + At(0.25))),
            3 => Triangular(At(0.5), middle, At(2)),
            4 => With(Triangular(At(0.75), middle, At(1.5)), ("lowPercentile", 10), ("highPercentile", 90)),
            5 => Of("pert", ("low", At(0.75)), ("mode", middle), ("high", At(2.5))),
            6 => Of("pert", ("low", At(0.5)), ("mode", middle), ("high", At(1.25)), ("weight", dice.Pick(2, 6))),
            7 => Of("pert", ("low", At(0.75)), ("mode", middle), ("high", At(1.75)), ("lowPercentile", 5), ("highPercentile", 90)),
            8 => dice.Chance(0.5)
                ? Of("normal", ("mean", middle), ("sd", At(0.25)))
                : Of("normal", ("mean", middle), ("sd", At(0.5)), ("min", At(0.25)), ("max", At(3))),
            // The median of a lognormal is its mean / √(1 + (sd/mean)²): four fifths of the mean at sd/mean = 3/4.
            9 => Of("lognormal", ("mean", middle * 1.25), ("sd", middle * 1.25 * 0.75)),
            10 => Of("lognormal", ("low", middle / 2), ("high", middle * 2), ("lowPercentile", 10), ("highPercentile", 90)),
            11 => Discrete(dice, middle),
            _ => Percentiles(middle),
        };
    }

    private static JsonObject Discrete(Dice dice, double middle) => new()
    {
        ["type"] = "discrete",
        ["outcomes"] = Dice.List(
            dice.Pick<double[]>([0.25, 0.5, 0.25], [0.4, 0.4, 0.2], [0.1, 0.2, 0.7])
                .Select((p, i) => new JsonObject { ["value"] = middle * new[] { 1, 0.5, 3 }[i], ["probability"] = p })),
    };

    // A flat stretch, where several percentages have one value, and a median between two points.
    private static JsonObject Percentiles(double middle) => new()
    {
        ["type"] = "percentiles",
        ["points"] = Dice.List(
            new[] { (0, 0.5), (25, 0.75), (75, 1.25), (80, 1.25), (100, 2.5) }
                .Select(x => new JsonObject { ["p"] = x.Item1, ["value"] = middle * x.Item2 })),
    };

    private static JsonObject Triangular(double low, double mode, double high) => Of("triangular", ("low", low), ("mode", mode), ("high", high));

    private static JsonObject Of(string type, params (string Name, double Value)[] members) => With(new JsonObject { ["type"] = type }, members);

    private static JsonObject With(JsonObject stated, params (string Name, double Value)[] members)
    {
        foreach (var (name, value) in members)
            stated[name] = value;
        return stated;
    }
}
