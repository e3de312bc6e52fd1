namespace Portfolio.Engine.Results;

/// <summary>
/// A project's share of the portfolio's contingency at one level, minor units; the error is half its 95 % interval, null below 20
/// iterations.
/// </summary>
public readonly record struct Share(Level Level, long Allocated, long? Error);

/// <summary>
/// A project's share at every kept level. Immutable. As bytes, little-endian with variable-length numbers: version, count, then for each
/// level the step of level and of share and the error plus one, 0 for none.
/// </summary>
public sealed class AllocatedCost
{
    private const byte Version = 1;

    private readonly Share[] shares;

    internal AllocatedCost(IReadOnlyList<Level> levels, long[] allocated, long[]? errors) =>
        shares = [.. levels.Select((level, i) => new Share(level, allocated[i], errors?[i]))];

    private AllocatedCost(Share[] shares) => this.shares = shares;

    /// <summary>By rising level.</summary>
    public IReadOnlyList<Share> Shares => shares;

    /// <summary>The share at a level; null when the level is not held.</summary>
    public Share? At(Level level)
    {
        foreach (var share in shares)
            if (share.Level == level) return share;
        return null;
    }

    public byte[] ToBytes()
    {
        var writer = new CompactWriter();
        writer.Byte(Version);
        writer.Unsigned((ulong)shares.Length);
        Share last = default;
        foreach (var share in shares)
        {
            writer.Unsigned((ulong)(share.Level.Millionths - last.Level.Millionths));
            writer.Signed(share.Allocated - last.Allocated);
            writer.Optional(share.Error);
            last = share;
        }
        return writer.ToArray();
    }

    /// <summary>Reads what <see cref="ToBytes"/> wrote.</summary>
    /// <exception cref="FormatException">Not such shares, cut short, or of an unknown version.</exception>
    public static AllocatedCost FromBytes(ReadOnlySpan<byte> bytes)
    {
        var reader = new CompactReader(bytes);
        if (reader.Byte() != Version) throw new FormatException("Shares of an unknown version.");
        var count = reader.Unsigned();
        if (count > 100_000) throw new FormatException("Shares at too many levels.");
        var shares = new Share[count];
        var (level, allocated) = (0, 0L);
        for (var i = 0; i < shares.Length; i++)
        {
            var at = reader.Level(level);
            allocated += reader.Signed();
            shares[i] = new(at, allocated, reader.Optional());
            level = at.Millionths;
        }
        return reader.AtEnd ? new(shares) : throw new FormatException("Shares with something behind them.");
    }
}
