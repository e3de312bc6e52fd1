using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;

namespace Portfolio.Store.Audit;

/// <summary>
/// How entries hang together. The hash of an entry is SHA-256, in lower-case hex, over its fields in the order sequence, microseconds,
/// actor, action, object, detail, previous hash: each as UTF-8 text preceded by its length in bytes and a colon, so that no two entries
/// read alike. Entry 1 follows sixty-four zeros.
/// </summary>
internal static class AuditChain
{
    public static readonly string Genesis = new('0', 64);

    private const string LastSql = "select sequence, hash from audit order by sequence desc limit 1";

    private const string InsertSql = """
        insert into audit (sequence, at, actor, action, object, detail, prev_hash, hash)
        values (@Sequence, @At, @Actor, @Action, @Object, @Detail, @PrevHash, @Hash)
        """;

    public static async Task AppendAsync(StoreTransaction open, string actor, string action, string @object, object detail)
    {
        var last = await open.FirstAsync<AuditRow>(LastSql);
        var entry = new AuditRow
        {
            Sequence = (last?.Sequence ?? 0) + 1,
            At = open.Now,
            Actor = actor,
            Action = action,
            Object = @object,
            Detail = JsonSerializer.Serialize(detail, JsonSerializerOptions.Web),
            PrevHash = last?.Hash ?? Genesis,
        };
        await open.ExecuteAsync(InsertSql, entry with { Hash = HashOf(entry) });
    }

    public const string AllSql = "select sequence, at, actor, action, object, detail, prev_hash, hash from audit order by sequence";

    /// <summary>Recomputes the chain from entry 1.</summary>
    /// <param name="entries">All of them, in the order of their numbers.</param>
    public static async Task<AuditVerification> VerifyAsync(IAsyncEnumerable<AuditRow> entries, CancellationToken cancellation)
    {
        var (sequence, head) = (0L, Genesis);
        await foreach (var entry in entries.WithCancellation(cancellation))
        {
            if (entry.Sequence != sequence + 1 || entry.PrevHash != head || entry.Hash != HashOf(entry))
                return new AuditVerification(sequence, sequence + 1, head);
            (sequence, head) = (entry.Sequence, entry.Hash);
        }
        return new AuditVerification(sequence, null, head);
    }

    public static string HashOf(AuditRow entry)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        Append(hash, entry.Sequence.ToString(CultureInfo.InvariantCulture));
        Append(hash, entry.At.ToString(CultureInfo.InvariantCulture));
        Append(hash, entry.Actor);
        Append(hash, entry.Action);
        Append(hash, entry.Object);
        Append(hash, entry.Detail);
        Append(hash, entry.PrevHash);
        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static void Append(IncrementalHash hash, string field)
    {
        var bytes = Encoding.UTF8.GetBytes(field);
        hash.AppendData(Encoding.UTF8.GetBytes(string.Create(CultureInfo.InvariantCulture, $"{bytes.Length}:")));
        hash.AppendData(bytes);
    }
}

internal sealed record AuditRow
{
    public long Sequence { get; init; }
    public long At { get; init; }
    public string Actor { get; init; } = "";
    public string Action { get; init; } = "";
    public string Object { get; init; } = "";
    public string Detail { get; init; } = "";
    public string PrevHash { get; init; } = "";
    public string Hash { get; init; } = "";
}
