namespace Portfolio.Engine.Results;

/// <summary>
/// A contingency at one level as bytes, little-endian with variable-length numbers: version, level, cost at the level, count, then of each
/// project its id (UTF-8 with its length), base, allocation, error plus one (0 for none) and standalone. Everything else follows from
/// these.
/// </summary>
public static class ContingencyBytes
{
    private const byte Version = 1;

    public static byte[] ToBytes(Contingency contingency)
    {
        var writer = new CompactWriter();
        writer.Byte(Version);
        writer.Unsigned((ulong)contingency.Level.Millionths);
        writer.Signed(contingency.CostAtLevel);
        writer.Unsigned((ulong)contingency.Allocations.Count);
        foreach (var allocation in contingency.Allocations)
        {
            writer.Text(allocation.Project);
            writer.Signed(allocation.Base);
            writer.Signed(allocation.Allocated);
            writer.Optional(allocation.Error);
            writer.Signed(allocation.Standalone);
        }
        return writer.ToArray();
    }

    /// <summary>Reads what <see cref="ToBytes"/> wrote.</summary>
    /// <exception cref="FormatException">Not a contingency, cut short, or of an unknown version.</exception>
    public static Contingency FromBytes(ReadOnlySpan<byte> bytes)
    {
        var reader = new CompactReader(bytes);
        if (reader.Byte() != Version) throw new FormatException("A contingency of an unknown version.");
        var level = reader.Level(0);
        var costAtLevel = reader.Signed();
        var lines = new List<ContingencyLine>();
        for (var left = reader.Unsigned(); left > 0; left--)
            lines.Add(new(reader.Text(), reader.Signed(), reader.Signed(), reader.Optional(), reader.Signed()));
        return reader.AtEnd
            ? Contingency.Of(level, costAtLevel, lines)
            : throw new FormatException("A contingency with something behind it.");
    }
}
