namespace Portfolio.Store.Runs;

/// <summary>A run as kept.</summary>
internal sealed record RunRow
{
    /// <summary>Of a run called <c>r</c>; progress is what the stored blocks cover.</summary>
    public const string Columns = """
        r.id, r.sequence, r.portfolio, r.kind, r.recorded, r.as_of, r.revision, r.overlay, r.seed, r.iterations, r.replaces, r.due_date,
        r.state, r.attempt, r.cancel_requested, r.fence, r.trace_parent, r.engine_version, r.inputs_digest, r.result_digest,
        r.queued_at, r.started_at, r.finished_at,
        r.requested_by, r.warnings, r.error, r.date_ends_at,
        coalesce((select cast(sum(b.iterations) as bigint) from run_block b where b.run = r.id), 0) as iterations_done,
        (select count(*) from series_point p where p.run = r.id) as represents
        """;

    public string Id { get; init; } = "";
    public long Sequence { get; init; }
    public string Portfolio { get; init; } = "";
    public string Kind { get; init; } = "";
    public long Recorded { get; init; }
    public string AsOf { get; init; } = "";
    public long Revision { get; init; }
    public byte[]? Overlay { get; init; }
    public long Seed { get; init; }
    public long Iterations { get; init; }
    public string? Replaces { get; init; }
    public string? DueDate { get; init; }
    public string State { get; init; } = "";
    public long Attempt { get; init; }
    public long CancelRequested { get; init; }
    public long Fence { get; init; }
    public string? TraceParent { get; init; }
    public string? EngineVersion { get; init; }
    public string? InputsDigest { get; init; }
    public string? ResultDigest { get; init; }
    public long QueuedAt { get; init; }
    public long? StartedAt { get; init; }
    public long? FinishedAt { get; init; }
    public string RequestedBy { get; init; } = "";
    public string? Warnings { get; init; }
    public string? Error { get; init; }
    public long DateEndsAt { get; init; }
    public long IterationsDone { get; init; }
    public long Represents { get; init; }

    public StoredRun ToRun() => new()
    {
        Id = Id,
        Sequence = Sequence,
        Portfolio = Portfolio,
        Kind = Kind == "nightly" ? RunKind.Nightly : RunKind.Request,
        Recorded = Recorded == 1,
        Represents = Represents > 0,
        AsOf = AsOf.ToDate(),
        Revision = Revision,
        Overlay = Overlay,
        Seed = Seed,
        Iterations = (int)Iterations,
        IterationsDone = (int)IterationsDone,
        Replaces = Replaces,
        DueDate = DueDate?.ToDate(),
        State = Enum.Parse<RunState>(State, ignoreCase: true),
        Attempt = (int)Attempt,
        CancelRequested = CancelRequested == 1,
        EngineVersion = EngineVersion,
        InputsDigest = InputsDigest,
        ResultDigest = ResultDigest,
        TraceParent = TraceParent,
        QueuedAt = QueuedAt.ToInstant(),
        StartedAt = StartedAt.ToInstant(),
        FinishedAt = FinishedAt.ToInstant(),
        RequestedBy = RequestedBy,
        Warnings = Warnings,
        Error = Error,
    };
}
