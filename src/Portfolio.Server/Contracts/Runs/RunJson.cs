using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Contracts.Runs;

/// <summary>One run of one frozen revision.</summary>
public sealed record RunJson
{
    /// <summary>UUIDv7.</summary>
    public required string Id { get; init; }

    /// <summary>queued, running, succeeded, failed or cancelled.</summary>
    public required string State { get; init; }

    /// <summary>0…1; 1 when it has succeeded.</summary>
    public required double Progress { get; init; }

    public required long Revision { get; init; }

    /// <summary>The local date for which it stands.</summary>
    public required DateOnly AsOf { get; init; }

    /// <summary>schedule or request.</summary>
    public required string Trigger { get; init; }

    /// <summary>Whether it shall be a point of the series once it has succeeded.</summary>
    public required bool Recorded { get; init; }

    public required int Iterations { get; init; }

    public required long Seed { get; init; }

    /// <summary>Version of the arithmetic that works it; absent before it is begun.</summary>
    public string? EngineVersion { get; init; }

    /// <summary>How often it was begun.</summary>
    public required int Attempt { get; init; }

    public required DateTimeOffset QueuedAt { get; init; }

    public DateTimeOffset? StartedAt { get; init; }

    public DateTimeOffset? FinishedAt { get; init; }

    /// <summary>Id of the key that asked for it.</summary>
    public required string RequestedBy { get; init; }

    /// <summary>The run that it was asked to replace.</summary>
    public string? Replaces { get; init; }

    /// <summary>SHA-256 over all that decides its figures.</summary>
    public string? InputsDigest { get; init; }

    /// <summary>SHA-256 over all result rows: two runs agree when it does.</summary>
    public string? ResultDigest { get; init; }

    /// <summary>Cautions that come with its figures.</summary>
    public IReadOnlyList<WarningJson>? Warnings { get; init; }

    /// <summary>Why it failed.</summary>
    public string? Error { get; init; }

    internal static RunJson From(StoredRun run, double progress, IReadOnlyList<WarningJson>? warnings) => new()
    {
        Id = run.Id,
        State = RunWords.State(run.State),
        Progress = progress,
        Revision = run.Revision,
        AsOf = run.AsOf,
        Trigger = run.Kind == RunKind.Nightly ? "schedule" : "request",
        Recorded = run.Recorded,
        Iterations = run.Iterations,
        Seed = run.Seed,
        EngineVersion = run.EngineVersion,
        Attempt = run.Attempt,
        QueuedAt = run.QueuedAt,
        StartedAt = run.StartedAt,
        FinishedAt = run.FinishedAt,
        RequestedBy = run.RequestedBy,
        Replaces = run.Replaces,
        InputsDigest = run.InputsDigest,
        ResultDigest = run.ResultDigest,
        Warnings = warnings,
        Error = run.Error,
    };
}

/// <summary>How far a run has come; the data of its progress events.</summary>
public sealed record RunProgressJson
{
    public required string Id { get; init; }

    public required string State { get; init; }

    /// <summary>0…1.</summary>
    public required double Progress { get; init; }
}

internal static class RunWords
{
    public static string State(RunState state) => state switch
    {
        RunState.Queued => "queued",
        RunState.Running => "running",
        RunState.Succeeded => "succeeded",
        RunState.Failed => "failed",
        _ => "cancelled",
    };
}
