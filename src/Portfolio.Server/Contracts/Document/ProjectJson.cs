using System.Text.Json;
using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>One project: its estimates, progress and risks.</summary>
public sealed record ProjectJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    public string? Programme { get; init; }

    /// <summary>Free texts by key (funding source, region …).</summary>
    public IReadOnlyDictionary<string, string>? Tags { get; init; }

    /// <summary>Whole number, 1 is served first by shared pools. Left out: 100.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Priority { get; init; }

    /// <summary>Progress is reported up to the beginning of this day.</summary>
    public string? StatusDate { get; init; }

    /// <summary>Left out: the portfolio's.</summary>
    public string? Calendar { get; init; }

    /// <summary>Reserved for currencies: refused until they are served.</summary>
    public JsonElement? Currency { get; init; }

    public CommitmentsJson? Commitments { get; init; }

    /// <summary>Rank correlation between the estimates of this project's activities, 0…0.99. Left out: 0.</summary>
    public double? Correlation { get; init; }

    /// <summary>Ids of drivers that act on every activity.</summary>
    public IReadOnlyList<string>? Drivers { get; init; }

    public OverheadJson? Overhead { get; init; }

    public IReadOnlyList<ActivityJson>? Activities { get; init; }

    public IReadOnlyList<RiskEventJson>? RiskEvents { get; init; }

    public IReadOnlyList<ChanceBranchesJson>? ChanceBranches { get; init; }

    internal Project ToModel(Reading reading, string path)
    {
        var project = Id ?? path.TrimStart('/');
        var place = new Place(path, project);
        reading.Reserved(place, "currency", Currency is { ValueKind: not JsonValueKind.Null });
        return new Project
        {
            Id = reading.Required(place, "id", Id),
            Name = Name,
            Programme = Programme,
            Tags = reading.Tags(place, Tags),
            Priority = (int)(reading.Whole(place, "priority", Priority) ?? 100),
            StatusDate = reading.RequiredDate(place, "statusDate", StatusDate),
            Calendar = Calendar,
            Commitments = Commitments?.ToModel(reading, place.Under("commitments")),
            Correlation = reading.Number(place, "correlation", Correlation),
            Drivers = reading.Texts(place, "drivers", Drivers),
            Overhead = Overhead?.ToModel(reading, place.Under("overhead")),
            Activities = reading.List(place, "activities", Activities, (activity, at) => activity.ToModel(reading, at.Path, project)),
            RiskEvents = reading.List(place, "riskEvents", RiskEvents, (risk, at) => risk.ToModel(reading, at.Path, project)),
            ChanceBranches = reading.List(place, "chanceBranches", ChanceBranches, (fork, at) => fork.ToModel(reading, at.Path, project)),
        };
    }
}

/// <summary>Running cost of the project, per working day of its calendar.</summary>
public sealed record OverheadJson
{
    /// <summary>Money per working day.</summary>
    public double? PerDay { get; init; }

    /// <summary>Exact money spent so far.</summary>
    [JsonConverter(typeof(AmountConverter))]
    public decimal? Actual { get; init; }

    internal Overhead ToModel(Reading reading, Place place) =>
        new(reading.Number(place, "perDay", PerDay) ?? 0, reading.Money(place, "actual", Actual) ?? 0);
}
