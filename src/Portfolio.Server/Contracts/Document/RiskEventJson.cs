using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Something that may happen once, with what it does and what can be done about it.</summary>
public sealed record RiskEventJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>0–1.</summary>
    public double? Probability { get; init; }

    public IReadOnlyList<ImpactJson>? Impacts { get; init; }

    /// <summary>At most one is taken.</summary>
    public IReadOnlyList<ResponseJson>? Responses { get; init; }

    /// <param name="project">Whose event it is; null for the portfolio's.</param>
    internal RiskEvent ToModel(Reading reading, string path, string? project)
    {
        var owner = project is null ? "" : $"{project}/";
        var place = new Place(path, $"{owner}event/{Id ?? path[(path.LastIndexOf('/') + 1)..]}");
        return new RiskEvent
        {
            Id = reading.Required(place, "id", Id),
            Name = Name,
            Probability = reading.RequiredNumber(place, "probability", Probability),
            Impacts = reading.List(place, "impacts", Impacts, (impact, at) => impact.ToModel(reading, at)),
            Responses = reading.List(place, "responses", Responses, (response, at) => response.ToModel(reading, at)),
        };
    }
}

/// <summary>Effect of an event: an activity's delay and cost, or a cost to a project.</summary>
public sealed record ImpactJson
{
    /// <summary>Id of an activity; in the settings project/activity. Left out: a cost to the project.</summary>
    public string? Activity { get; init; }

    /// <summary>In the settings: the project that bears the cost.</summary>
    public string? Project { get; init; }

    /// <summary>Working days.</summary>
    public DistributionJson? Delay { get; init; }

    /// <summary>Money; negative for an opportunity.</summary>
    public DistributionJson? Cost { get; init; }

    internal Impact ToModel(Reading reading, Place place) =>
        new(Activity, Project, Delay?.ToModel(reading, place, "delay"), Cost?.ToModel(reading, place, "cost"));
}

/// <summary>When taken it replaces the event's probability and impacts and adds its certain cost.</summary>
public sealed record ResponseJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>Exact money.</summary>
    [JsonConverter(typeof(AmountConverter))]
    public decimal? Cost { get; init; }

    /// <summary>0–1. Left out: 0.</summary>
    public double? Probability { get; init; }

    public IReadOnlyList<ImpactJson>? Impacts { get; init; }

    public bool? Taken { get; init; }

    /// <summary>In the settings: the project that pays.</summary>
    public string? Project { get; init; }

    internal Response ToModel(Reading reading, Place place) => new()
    {
        Id = reading.Required(place, "id", Id),
        Name = Name,
        Cost = reading.Money(place, "cost", Cost) ?? 0,
        Probability = reading.Number(place, "probability", Probability) ?? 0,
        Impacts = reading.List(place, "impacts", Impacts, (impact, at) => impact.ToModel(reading, at)),
        Taken = Taken ?? false,
        Project = Project,
    };
}
