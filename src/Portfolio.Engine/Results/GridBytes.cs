namespace Portfolio.Engine.Results;

/// <summary>
/// Grids as bytes, little-endian: version, metric, flags, date rule, iterations, mean, spread, references, then the levels in rising
/// order, each as the step from the one before and its bounds as distances from its value. Whole numbers are variable-length, 7 bits to
/// a byte, signed ones folded (0, −1, 1, −2 …). A finish of 104 levels takes about 1 KB. The same grid always gives the same bytes.
/// </summary>
public static class GridBytes
{
    private const byte Version = 1;

    [Flags]
    private enum Flags : byte
    {
        Opens = 1,
        Base = 2,
        Commitment = 4,
    }

    public static byte[] ToBytes(Grid grid)
    {
        var writer = new CompactWriter();
        writer.Byte(Version);
        writer.Byte((byte)grid.Metric);
        writer.Byte((byte)FlagsOf(grid));
        writer.Unsigned((ulong)grid.Dates.EarliestDay);
        writer.Unsigned((ulong)grid.Iterations);
        writer.Unsigned((ulong)grid.Happening);
        writer.Double(grid.Mean);
        writer.Double(grid.Sd);
        Write(writer, grid.Base);
        Write(writer, grid.Commitment);
        writer.Unsigned((ulong)grid.Percentiles.Count);
        var (level, value) = (0, 0L);
        foreach (var percentile in grid.Percentiles)
        {
            writer.Unsigned((ulong)(percentile.Level.Millionths - level));
            writer.Signed(percentile.Value - value);
            writer.Optional(percentile.Value - percentile.SamplingLow);
            writer.Optional(percentile.SamplingHigh - percentile.Value);
            (level, value) = (percentile.Level.Millionths, percentile.Value);
        }
        return writer.ToArray();
    }

    /// <summary>Reads what <see cref="ToBytes"/> wrote.</summary>
    /// <exception cref="FormatException">Not a grid, cut short, or of an unknown version.</exception>
    public static Grid FromBytes(ReadOnlySpan<byte> bytes)
    {
        var reader = new CompactReader(bytes);
        if (reader.Byte() != Version) throw new FormatException("A grid of an unknown version.");
        var metric = (Metric)reader.Byte();
        if (metric is not (Metric.Finish or Metric.Cost)) throw new FormatException("A grid of an unknown metric.");
        var flags = (Flags)reader.Byte();
        var dates = new DateRule(flags.HasFlag(Flags.Opens), (int)reader.Unsigned());
        var (iterations, happening) = ((int)reader.Unsigned(), (int)reader.Unsigned());
        var (mean, sd) = (reader.Double(), reader.Double());
        var basis = flags.HasFlag(Flags.Base) ? ReadReference(ref reader) : (Reference?)null;
        var commitment = flags.HasFlag(Flags.Commitment) ? ReadReference(ref reader) : (Reference?)null;
        return new Grid(ReadPercentiles(ref reader))
        {
            Metric = metric, Dates = dates, Iterations = iterations, Happening = happening, Mean = mean, Sd = sd, Base = basis,
            Commitment = commitment,
        };
    }

    private static Flags FlagsOf(Grid grid) =>
        (grid.Dates.Opens ? Flags.Opens : 0) | (grid.Base is null ? 0 : Flags.Base) | (grid.Commitment is null ? 0 : Flags.Commitment);

    private static void Write(CompactWriter writer, Reference? reference)
    {
        if (reference is not { } known) return;
        writer.Signed(known.Value);
        writer.Unsigned((ulong)known.Kept);
    }

    private static Reference ReadReference(ref CompactReader reader) => new(reader.Signed(), (int)reader.Unsigned());

    private static Percentile[] ReadPercentiles(ref CompactReader reader)
    {
        var count = reader.Unsigned();
        if (count > 100_000) throw new FormatException("A grid with too many levels.");
        var percentiles = new Percentile[count];
        var (level, value) = (0, 0L);
        for (var i = 0; i < percentiles.Length; i++)
        {
            var at = reader.Level(level);
            value += reader.Signed();
            percentiles[i] = new(at, value, value - reader.Optional(), value + reader.Optional());
            level = at.Millionths;
        }
        if (!reader.AtEnd) throw new FormatException("A grid with something behind it.");
        return percentiles;
    }
}
