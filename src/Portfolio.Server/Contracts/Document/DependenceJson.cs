using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A common cause that multiplies durations and costs of what it acts on.</summary>
public sealed record DriverJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>0–1. Left out: 1.</summary>
    public double? Probability { get; init; }

    public DistributionJson? DurationFactor { get; init; }

    public DistributionJson? CostFactor { get; init; }

    internal Driver ToModel(Reading reading, string path)
    {
        var place = new Place(path, Id is null ? "settings" : $"driver/{Id}");
        return new Driver(
            reading.Required(place, "id", Id), Name, reading.Number(place, "probability", Probability) ?? 1,
            DurationFactor?.ToModel(reading, place, "durationFactor"), CostFactor?.ToModel(reading, place, "costFactor"));
    }
}

/// <summary>How the estimates of different projects move together, as rank correlations.</summary>
public sealed record DependenceJson
{
    /// <summary>0…0.99. Left out: 0.</summary>
    public double? BetweenProjects { get; init; }

    /// <summary>At least betweenProjects. Left out: the same.</summary>
    public double? WithinProgramme { get; init; }

    public IReadOnlyList<RankPairJson>? Pairs { get; init; }

    /// <summary>What to do with correlations that contradict each other. Left out: refuse.</summary>
    public string? Repair { get; init; }

    internal Dependence ToModel(Reading reading, string path)
    {
        var place = new Place(path, "settings");
        return new Dependence
        {
            BetweenProjects = reading.Number(place, "betweenProjects", BetweenProjects) ?? 0,
            WithinProgramme = reading.Number(place, "withinProgramme", WithinProgramme),
            Pairs = reading.List(place, "pairs", Pairs, (pair, at) => pair.ToModel(reading, at)),
            Repair = reading.Word(place, "repair", Repair, Words.Repairs) ?? MatrixRepair.Refuse,
            Stated = true,
        };
    }
}

/// <summary>Rank correlation of two nodes: driver/{id}, project/{id}, or a driver and portfolio or programme/{id}.</summary>
public sealed record RankPairJson
{
    /// <summary>Two nodes.</summary>
    public IReadOnlyList<string>? Between { get; init; }

    /// <summary>−1…1.</summary>
    public double? Rank { get; init; }

    internal RankPair ToModel(Reading reading, Place place)
    {
        if (Between is null)
            reading.Missing(place, "between");
        var nodes = reading.Texts(place, "between", Between);
        if (Between is not null && nodes.Count != 2)
            reading.Refuse(place, "between", FaultCodes.PairSize, "'between' names exactly two nodes.");
        var named = nodes.Count == 2;
        return new RankPair(named ? nodes[0] : "", named ? nodes[1] : "", reading.RequiredNumber(place, "rank", Rank));
    }
}
