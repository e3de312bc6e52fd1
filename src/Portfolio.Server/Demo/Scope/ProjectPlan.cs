using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Demo.Scope;

/// <summary>A project of the demo as its planner would describe it. Money in thousands of euros.</summary>
/// <param name="StartWeek">When work begins, in weeks from the first week of the history; most projects began before it.</param>
internal sealed record ProjectPlan(string Id, string Name, int StartWeek, int Priority)
{
    public required string Region { get; init; }

    public required string Funding { get; init; }

    /// <summary>Rank correlation between the project's own estimates.</summary>
    public required double Correlation { get; init; }

    public double OverheadPerDay { get; init; } = 4;

    public IReadOnlyList<string>? Drivers { get; init; }

    public string Survey { get; init; } = "Topographic and utility survey";

    public string Permits { get; init; } = "Planning and water permits";

    /// <summary>Factors on durations and costs of preparation and completion.</summary>
    public (double Days, double Cost) Size { get; init; } = (1, 1);

    /// <summary>The works themselves, a <see cref="ScopeTable"/>.</summary>
    public required string Works { get; init; }

    /// <summary>What must be finished before commissioning.</summary>
    public required string WorksEnd { get; init; }

    public IReadOnlyList<ChanceBranchesJson>? Forks { get; init; }

    public ProjectJson ToProject(string programme, Func<int, string> dateOfWeek)
    {
        var preparation = Stages.Preparation
            .Replace("{survey}", Survey, StringComparison.Ordinal).Replace("{permits}", Permits, StringComparison.Ordinal);
        var completion = Stages.Completion.Replace("{works}", WorksEnd, StringComparison.Ordinal);
        return new ProjectJson
        {
            Id = Id,
            Name = Name,
            Programme = programme,
            Tags = new Dictionary<string, string> { ["funding"] = Funding, ["region"] = Region },
            Priority = Priority,
            Correlation = Correlation,
            Drivers = Drivers,
            Overhead = new OverheadJson { PerDay = OverheadPerDay * 1000 },
            Activities =
            [
                .. ScopeTable.Read(preparation, Size.Days, Size.Cost)
                    .Select(activity => activity.Predecessors is null ? activity with { EarliestStart = dateOfWeek(StartWeek) } : activity),
                .. ScopeTable.Read(Works),
                .. ScopeTable.Read(completion, Size.Days, Size.Cost),
            ],
            ChanceBranches = Forks,
        };
    }

    /// <summary>A fork of two or more ways: id, probability, activities.</summary>
    public static ChanceBranchesJson Fork(
        string id, string name, params (string Id, double Probability, string[] Activities)[] branches) => new()
    {
        Id = id,
        Name = name,
        Branches =
        [
            .. from branch in branches
               select new BranchJson { Id = branch.Id, Probability = branch.Probability, Activities = branch.Activities },
        ],
    };
}
