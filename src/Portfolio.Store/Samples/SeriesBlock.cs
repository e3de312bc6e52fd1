namespace Portfolio.Store.Samples;

/// <summary>The names under which samples are kept.</summary>
public static class SeriesNames
{
    public static string Finish(string project) => $"finish/{project}";

    public static string Cost(string project) => $"cost/{project}";

    public static string Milestone(string project, string activity) => $"milestone/{project}/{activity}";

    /// <summary>The project whose grant reaches the series; null when the name has another form.</summary>
    internal static string? ProjectOf(string series) => series.Split('/') is [_, var project, ..] ? project : null;
}

/// <summary>One series over the iterations of one block, in their order; packed by whoever makes it, on the thread that does.</summary>
public sealed class SeriesBlock
{
    private SeriesBlock(string series, (int Codec, byte[] Bytes) packed) => (Series, Codec, Bytes) = (series, packed.Codec, packed.Bytes);

    public string Series { get; }

    internal int Codec { get; }

    internal byte[] Bytes { get; }

    /// <summary>Instants in minutes; <see cref="int.MinValue"/> where the thing does not happen.</summary>
    public static SeriesBlock OfMinutes(string series, ReadOnlySpan<int> values) => new(series, SampleCodec.Encode(values));

    /// <summary>Money in minor units; any doubles are kept exactly, whole ones in less room.</summary>
    public static SeriesBlock OfMoney(string series, ReadOnlySpan<double> values) => new(series, SampleCodec.Encode(values));
}
