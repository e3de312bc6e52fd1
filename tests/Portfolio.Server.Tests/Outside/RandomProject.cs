using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>A project of a random document while it is made.</summary>
internal sealed class RandomProject
{
    public required string Id { get; init; }

    public required string? Programme { get; init; }

    public required DateOnly Status { get; init; }

    /// <summary>Digits of money after the point.</summary>
    public required int Digits { get; init; }

    /// <summary>In document order.</summary>
    public required IReadOnlyList<RandomActivity> Activities { get; init; }
}

/// <summary>An activity of a random document while it is made.</summary>
internal sealed class RandomActivity
{
    public required string Id { get; init; }

    /// <summary>Links lead from lower to higher places, over all projects, so that they never form a cycle.</summary>
    public required double Place { get; init; }

    public required bool Milestone { get; init; }

    public required Progress Progress { get; init; }

    public bool Started => Progress != Progress.Ahead;

    public JsonObject Json { get; } = [];
}

internal enum Progress
{
    Ahead,
    UnderWay,
    Finished,
}
