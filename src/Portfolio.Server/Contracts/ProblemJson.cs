namespace Portfolio.Server.Contracts;

/// <summary>What went wrong, as RFC 9457 lays it out.</summary>
public sealed record ProblemJson
{
    /// <summary>Address of the kind of problem; stable.</summary>
    public required string Type { get; init; }

    public required string Title { get; init; }

    public required int Status { get; init; }

    public string? Detail { get; init; }

    /// <summary>Names this request in the logs.</summary>
    public string? TraceId { get; init; }

    /// <summary>Every fault found in what was sent, in document order, at most 1,000.</summary>
    public IReadOnlyList<FaultJson>? Errors { get; init; }

    /// <summary>How many more there are.</summary>
    public int? ErrorsOmitted { get; init; }
}

/// <summary>One fault in what was sent.</summary>
public sealed record FaultJson
{
    /// <summary>
    /// RFC 6901 pointer into the JSON that was sent, or empty when the fault lies in what is stored; absent where line and column of a table
    /// stand for it.
    /// </summary>
    public string? Path { get; init; }

    /// <summary>The thing at fault, such as weir-lock/A10.</summary>
    public required string Subject { get; init; }

    /// <summary>Stable code.</summary>
    public required string Code { get; init; }

    public required string Message { get; init; }

    /// <summary>Line from 1, of a table or of text that could not be read.</summary>
    public int? Line { get; init; }

    /// <summary>Column from 1: of a table the cell in its line, of text that could not be read the character.</summary>
    public int? Column { get; init; }

    internal static FaultJson From(Model.Faults.Fault fault) =>
        new() { Path = fault.Path, Subject = fault.Subject, Code = fault.Code, Message = fault.Message };
}
