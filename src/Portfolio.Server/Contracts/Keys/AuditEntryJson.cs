using System.Text.Json;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Contracts.Keys;

/// <summary>One line of the audit trail. Lines are only ever appended; each carries the hash of the one before.</summary>
public sealed record AuditEntryJson
{
    /// <summary>1, 2, 3 … without gaps.</summary>
    public required long Sequence { get; init; }

    public required DateTimeOffset At { get; init; }

    /// <summary>Id of the key that acted.</summary>
    public required string Actor { get; init; }

    /// <summary>A noun and a verb: document.put, key.rotate, run.queued …</summary>
    public required string Action { get; init; }

    /// <summary>What it was done to: portfolios/weir-portfolio, keys/0123456789abcdef …</summary>
    public required string Object { get; init; }

    /// <summary>Depends on the action. Of a refused write: outcome, status, problem, number of faults and how often each code occurs.</summary>
    public required JsonElement Detail { get; init; }

    /// <summary>SHA-256 of the entry before; zeros before the first.</summary>
    public required string PreviousHash { get; init; }

    /// <summary>SHA-256 of this entry with the hash before it.</summary>
    public required string Hash { get; init; }

    internal static AuditEntryJson From(AuditEntry entry) => new()
    {
        Sequence = entry.Sequence,
        At = entry.At,
        Actor = entry.Actor,
        Action = entry.Action,
        Object = entry.Object,
        Detail = JsonElement.Parse(entry.Detail),
        PreviousHash = entry.PreviousHash,
        Hash = entry.Hash,
    };
}
