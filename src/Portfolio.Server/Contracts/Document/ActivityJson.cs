using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Work to be done, or a milestone. Durations are working days of the activity's calendar.</summary>
public sealed record ActivityJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>True: no duration, cost or demand; reported on its own.</summary>
    public bool? Milestone { get; init; }

    /// <summary>Promised date of a milestone.</summary>
    public string? Commitment { get; init; }

    /// <summary>Working days; required unless milestone or finished.</summary>
    public DistributionJson? Duration { get; init; }

    public ActivityCostJson? Cost { get; init; }

    public IReadOnlyList<LinkJson>? Predecessors { get; init; }

    public IReadOnlyList<DemandJson>? Demands { get; init; }

    public IReadOnlyList<string>? Drivers { get; init; }

    /// <summary>Left out: the project's.</summary>
    public string? Calendar { get; init; }

    public string? EarliestStart { get; init; }

    public IReadOnlyDictionary<string, string>? Tags { get; init; }

    public string? ActualStart { get; init; }

    public string? ActualFinish { get; init; }

    /// <summary>Working days still to go of work that has started and not finished.</summary>
    public DistributionJson? Remaining { get; init; }

    internal Activity ToModel(Reading reading, string path, string project)
    {
        var place = new Place(path, $"{project}/{Id ?? path[(path.LastIndexOf('/') + 1)..]}");
        return new Activity
        {
            Id = reading.Required(place, "id", Id),
            Name = Name,
            Milestone = Milestone ?? false,
            Commitment = reading.Date(place, "commitment", Commitment),
            Duration = Duration?.ToModel(reading, place, "duration"),
            Cost = Cost?.ToModel(reading, place.Under("cost")),
            Predecessors = reading.List(place, "predecessors", Predecessors, (link, at) => link.ToModel(reading, at)),
            Demands = reading.List(place, "demands", Demands, (demand, at) => demand.ToModel(reading, at)),
            Drivers = reading.Texts(place, "drivers", Drivers),
            Calendar = Calendar,
            EarliestStart = reading.Date(place, "earliestStart", EarliestStart),
            Tags = reading.Tags(place, Tags),
            ActualStart = reading.Date(place, "actualStart", ActualStart),
            ActualFinish = reading.Date(place, "actualFinish", ActualFinish),
            Remaining = Remaining?.ToModel(reading, place, "remaining"),
        };
    }
}

/// <summary>Cost to go, fixed and per working day, and what has been spent.</summary>
public sealed record ActivityCostJson
{
    /// <summary>Money.</summary>
    public DistributionJson? Fixed { get; init; }

    /// <summary>Money per working day.</summary>
    public DistributionJson? PerDay { get; init; }

    /// <summary>Exact money spent so far.</summary>
    [JsonConverter(typeof(AmountConverter))]
    public decimal? Actual { get; init; }

    internal ActivityCost ToModel(Reading reading, Place place) => new(
        Fixed?.ToModel(reading, place, "fixed"), PerDay?.ToModel(reading, place, "perDay"), reading.Money(place, "actual", Actual) ?? 0);
}
