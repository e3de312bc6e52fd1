using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A fork of which exactly one branch happens.</summary>
public sealed record ChanceBranchesJson
{
    public string? Id { get; init; }

    public string? Name { get; init; }

    /// <summary>Probabilities sum to 1.</summary>
    public IReadOnlyList<BranchJson>? Branches { get; init; }

    internal ChanceBranches ToModel(Reading reading, string path, string project)
    {
        var place = new Place(path, $"{project}/branches/{Id ?? path[(path.LastIndexOf('/') + 1)..]}");
        return new ChanceBranches(
            reading.Required(place, "id", Id), Name,
            reading.List(place, "branches", Branches, (branch, at) => branch.ToModel(reading, at)));
    }
}

/// <summary>One way it can go.</summary>
public sealed record BranchJson
{
    public string? Id { get; init; }

    /// <summary>0–1.</summary>
    public double? Probability { get; init; }

    /// <summary>Ids of the activities that happen only then.</summary>
    public IReadOnlyList<string>? Activities { get; init; }

    internal Branch ToModel(Reading reading, Place place) => new(
        reading.Required(place, "id", Id), reading.RequiredNumber(place, "probability", Probability),
        reading.Texts(place, "activities", Activities));
}
