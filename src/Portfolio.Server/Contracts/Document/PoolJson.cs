using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A crew or machine that projects share.</summary>
public sealed record PoolJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>Units, until the first change.</summary>
    public double? Capacity { get; init; }

    public IReadOnlyList<CapacityChangeJson>? CapacityChanges { get; init; }

    internal Pool ToModel(Reading reading, string path)
    {
        var place = new Place(path, Id is null ? "settings" : $"pool/{Id}");
        return new Pool(
            reading.Required(place, "id", Id), Name, reading.RequiredNumber(place, "capacity", Capacity),
            reading.List(place, "capacityChanges", CapacityChanges, (change, at) => change.ToModel(reading, at)));
    }
}

/// <summary>Capacity from the beginning of a day on.</summary>
public sealed record CapacityChangeJson
{
    public string? From { get; init; }

    public double? Capacity { get; init; }

    internal CapacityChange ToModel(Reading reading, Place place) =>
        new(reading.RequiredDate(place, "from", From), reading.RequiredNumber(place, "capacity", Capacity));
}

/// <summary>Units of a pool held from start to finish.</summary>
public sealed record DemandJson
{
    public string? Pool { get; init; }

    public double? Units { get; init; }

    internal Demand ToModel(Reading reading, Place place) =>
        new(reading.Required(place, "pool", Pool), reading.RequiredNumber(place, "units", Units));
}
