using System.Numerics;
using System.Text.Json.Serialization;
using Portfolio.Model.Distributions;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A distribution: a plain number is a constant, otherwise an object with a type and the members of that type.</summary>
[JsonConverter(typeof(DistributionConverter))]
public sealed class DistributionJson
{
    private readonly double[] values;

    /// <param name="values">Those in <paramref name="sent"/>, in its order.</param>
    internal DistributionJson(
        string? type, Numbers sent, double[] values, IReadOnlyList<(double First, double Second)>? pairs, IReadOnlyList<Misfit> misfits)
    {
        Type = type;
        Sent = sent;
        this.values = values;
        Pairs = pairs;
        Misfits = misfits;
    }

    /// <summary>Null when it was sent as a plain number.</summary>
    internal string? Type { get; }

    internal Numbers Sent { get; }

    /// <summary>Outcomes (value, probability) or points (p, value).</summary>
    internal IReadOnlyList<(double First, double Second)>? Pairs { get; }

    internal IReadOnlyList<Misfit> Misfits { get; }

    internal double? this[Numbers number] =>
        (Sent & number) == 0 ? null : values[BitOperations.PopCount((uint)Sent & ((uint)number - 1))];

    internal Distribution ToModel(Reading reading, Place owner, string member)
    {
        if (Misfits.Count == 0)
            return ToModel();
        var place = new Place(owner.Member(member), owner.Subject);
        foreach (var misfit in Misfits)
            misfit.Report(reading, place);
        return Unreadable.Instance;
    }

    private Distribution ToModel() => Type switch
    {
        null or "constant" => new Constant(Needed(Numbers.Value)),
        "uniform" => new Uniform(Needed(Numbers.Low), Needed(Numbers.High)),
        "triangular" => new Triangular(Needed(Numbers.Low), Needed(Numbers.Mode), Needed(Numbers.High), LowPercentile, HighPercentile),
        "pert" => new Pert(
            Needed(Numbers.Low), Needed(Numbers.Mode), Needed(Numbers.High), this[Numbers.Weight] ?? 4, LowPercentile, HighPercentile),
        "normal" => new Normal(Needed(Numbers.Mean), Needed(Numbers.Sd), this[Numbers.Min], this[Numbers.Max]),
        "lognormal" when this[Numbers.Mean] is { } mean => new LognormalByMoments(mean, Needed(Numbers.Sd)),
        "lognormal" => new LognormalByPercentiles(Needed(Numbers.Low), Needed(Numbers.High), LowPercentile, HighPercentile),
        "discrete" => new Discrete([.. Pairs!.Select(pair => new Outcome(pair.First, pair.Second))]),
        _ => new Percentiles([.. Pairs!.Select(pair => new PercentilePoint(pair.First, pair.Second))]),
    };

    private double LowPercentile => this[Numbers.LowPercentile] ?? 0;

    private double HighPercentile => this[Numbers.HighPercentile] ?? 100;

    private double Needed(Numbers number) => this[number]!.Value;
}
