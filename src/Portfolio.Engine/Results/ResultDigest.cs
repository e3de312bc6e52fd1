using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Engine.Results;

/// <summary>
/// SHA-256 over all result rows: two runs agree when it does. Rows are taken in ordinal order of the written scope, whatever order they
/// come in; of each the scope in UTF-8, the bytes of the finish grid and of the cost grid, and the joint row (day, minor units, count),
/// each
/// field with its length in front as a little-endian 32-bit number, 0 for one that is missing.
/// </summary>
public static class ResultDigest
{
    /// <summary>The digest in lower-case hexadecimal, 64 characters.</summary>
    public static string Of(IEnumerable<ScopeResult> rows)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var row in rows.OrderBy(row => row.Scope.ToString(), StringComparer.Ordinal))
        {
            Field(hash, Encoding.UTF8.GetBytes(row.Scope.ToString()));
            Field(hash, GridBytes.ToBytes(row.Finish));
            Field(hash, row.Cost is null ? [] : GridBytes.ToBytes(row.Cost));
            Field(hash, row.Joint is null ? [] : Bytes(row.Joint));
        }
        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static byte[] Bytes(JointConfidence joint)
    {
        var writer = new CompactWriter();
        writer.Signed(Instants.ToDay(joint.Finish));
        writer.Signed(joint.Budget);
        writer.Unsigned((ulong)joint.Kept);
        return writer.ToArray();
    }

    private static void Field(IncrementalHash hash, ReadOnlySpan<byte> bytes)
    {
        Span<byte> length = stackalloc byte[sizeof(int)];
        BinaryPrimitives.WriteInt32LittleEndian(length, bytes.Length);
        hash.AppendData(length);
        hash.AppendData(bytes);
    }
}
