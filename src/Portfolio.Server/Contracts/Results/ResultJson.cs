namespace Portfolio.Server.Contracts.Results;

/// <summary>The finished result of one scope of a run: when it is done, what it costs, and how sure both are.</summary>
public sealed record ResultJson
{
    /// <summary>Written <c>portfolio</c>, <c>programme/p</c>, <c>project/p</c> or <c>milestone/p/a</c>.</summary>
    public required string Scope { get; init; }

    public required string Run { get; init; }

    public required DateOnly AsOf { get; init; }

    public required long Revision { get; init; }

    /// <summary>Of the portfolio or a programme: the projects whose figures it joins.</summary>
    public IReadOnlyList<string>? Projects { get; init; }

    /// <summary>Of a milestone in a chance branch: the share of iterations in which it happens, 0–1. The rest is over these.</summary>
    public double? Happens { get; init; }

    public required FinishJson Finish { get; init; }

    /// <summary>Milestones have none.</summary>
    public CostJson? Cost { get; init; }

    /// <summary>Only where both a finish and a budget are promised.</summary>
    public JointJson? Joint { get; init; }

    /// <summary>What a reader of the figures must know; in a list it stands once, beside the rows.</summary>
    public IReadOnlyList<WarningJson>? Warnings { get; init; }
}

/// <summary>The probability, 0–1, of keeping the promised finish and the promised budget together.</summary>
public sealed record JointJson(DateOnly Finish, decimal Budget, double Probability);

/// <summary>A caution that comes with figures.</summary>
/// <param name="Code">Never changes meaning.</param>
/// <param name="Subjects">The things it is about, such as <c>weir-lock/A10</c>; absent when it is about all of them.</param>
/// <param name="Scopes">The scopes whose figures it concerns, a project's with its milestones; absent when it concerns all.</param>
public sealed record WarningJson(string Code, string Message, IReadOnlyList<string>? Subjects = null, IReadOnlyList<string>? Scopes = null);

/// <summary>The results of a run, one row for each scope, with the cautions that hold for all of them.</summary>
public sealed record ResultListJson
{
    public required IReadOnlyList<ResultJson> Items { get; init; }

    public required IReadOnlyList<WarningJson> Warnings { get; init; }

    /// <summary>Cursor of the next page; absent on the last.</summary>
    public string? Next { get; init; }
}
