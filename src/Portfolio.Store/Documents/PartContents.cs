using System.IO.Compression;

namespace Portfolio.Store.Documents;

/// <summary>
/// Contents by hash, each kept once and compressed. The same project in a hundred revisions, or portfolios, takes the room of one.
/// </summary>
internal static class PartContents
{
    // Brotli at 4 brings a project of 50 KB to a fifth within half a millisecond; higher levels cost much more time for little room.
    private const int Quality = 4;
    private const int Window = 22;

    private const string InsertSql =
        "insert into part_content (hash, bytes, size) values (@Hash, @Bytes, @Size) on conflict (hash) do nothing";

    private const string KnownSql = "select hash from part_content where hash in (@Keys)";

    private const string InsertOutlineSql =
        "insert into part_outline (hash, bytes) values (@Hash, @Outline) on conflict (hash) do nothing";

    /// <summary>Keeps those that are not there yet; they are compressed beside each other, for the write lock is held meanwhile.</summary>
    public static async Task KeepAsync(StoreTransaction open, IEnumerable<ProposedPart> parts)
    {
        var sent = parts.ToList();
        var known = (await open.ListOfAsync<string>(KnownSql, sent.Select(part => part.Hash))).ToHashSet(StringComparer.Ordinal);
        var unknown = sent.FindAll(part => !known.Contains(part.Hash));
        var compressed = new byte[unknown.Count][];
        if (compressed.Length == 1)
            compressed[0] = Compress(unknown[0].Bytes);
        else
            Parallel.For(0, compressed.Length, i => compressed[i] = Compress(unknown[i].Bytes));
        await open.ExecuteEachAsync(
            InsertSql, unknown.Zip(compressed, (part, bytes) => new { part.Hash, Bytes = bytes, Size = part.Bytes.Length }));
        await open.ExecuteEachAsync(
            InsertOutlineSql, unknown.Where(part => part.Outline is not null).Select(part => new { part.Hash, part.Outline }));
    }

    private const string OutlineSql = "select bytes from part_outline where hash = @Hash";

    /// <summary>Null when none was kept with the content.</summary>
    public static Task<byte[]?> ReadOutlineAsync(StoreTransaction open, string hash) =>
        open.FirstAsync<byte[]>(OutlineSql, new { Hash = hash });

    private const string ReadSql = "select hash, bytes, size from part_content where hash = @Hash";

    public static async Task<byte[]> ReadAsync(StoreTransaction open, string hash)
    {
        var row = await open.FirstAsync<ContentRow>(ReadSql, new { Hash = hash }) 
            ?? throw new StoreDamagedException($"The content {hash} of a part is missing.");
        return row.Expand();
    }

    public static byte[] Compress(byte[] bytes)
    {
        var buffer = new byte[BrotliEncoder.GetMaxCompressedLength(bytes.Length)];
        return BrotliEncoder.TryCompress(bytes, buffer, out var written, Quality, Window)
            ? buffer[..written]
            : throw new InvalidOperationException("Brotli wrote more than its own upper bound.");
    }
}

internal sealed record ContentRow
{
    public string Project { get; init; } = "";
    public string Hash { get; init; } = "";
    public byte[] Bytes { get; init; } = [];
    public long Size { get; init; }

    /// <summary>The content, checked against the hash that names it.</summary>
    public byte[] Expand()
    {
        var expanded = new byte[Size];
        if (!BrotliDecoder.TryDecompress(Bytes, expanded, out var written) || written != Size || ContentHash.Of(expanded) != Hash)
            throw new StoreDamagedException($"The stored content {Hash} of a part is not what was written.");
        return expanded;
    }

    public StoredPart ToPart() => new(Project, Hash, Expand());
}
