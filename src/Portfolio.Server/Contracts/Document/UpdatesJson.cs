using System.Text.Json.Serialization;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>
/// What other systems report, all or nothing. A member that is sent replaces the stored one whole; only cost and overhead are merged one
/// level deeper; null removes.
/// </summary>
public sealed record UpdatesJson
{
    /// <summary>One for each project.</summary>
    public IReadOnlyList<ProjectUpdateJson>? Updates { get; init; }
}

/// <summary>What changes in one project.</summary>
public sealed record ProjectUpdateJson
{
    /// <summary>Id of the project, which must be there.</summary>
    public string? Project { get; init; }

    /// <summary>True: activities that are not there yet are added as the last ones.</summary>
    public bool? Create { get; init; }

    public string? Name { get; init; }

    public string? Programme { get; init; }

    public IReadOnlyDictionary<string, string>? Tags { get; init; }

    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Priority { get; init; }

    public string? StatusDate { get; init; }

    public string? Calendar { get; init; }

    public CommitmentsJson? Commitments { get; init; }

    public double? Correlation { get; init; }

    public IReadOnlyList<string>? Drivers { get; init; }

    public OverheadJson? Overhead { get; init; }

    /// <summary>What changes in activities, each named by its id; the others stay.</summary>
    public IReadOnlyList<ActivityJson>? Activities { get; init; }

    public IReadOnlyList<RiskEventJson>? RiskEvents { get; init; }

    public IReadOnlyList<ChanceBranchesJson>? ChanceBranches { get; init; }
}
