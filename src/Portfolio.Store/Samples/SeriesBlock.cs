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

/// <summary>One series over the iterations of one block, in their order.</summary>
public abstract record SeriesBlock
{
    private protected SeriesBlock(string series) => Series = series;

    public string Series { get; }

    /// <summary>Instants in minutes; <see cref="int.MinValue"/> where the thing does not happen.</summary>
    public static SeriesBlock OfMinutes(string series, ReadOnlyMemory<int> values) => new MinuteBlock(series, values);

    /// <summary>Money in minor units; any doubles are kept exactly, whole ones in less room.</summary>
    public static SeriesBlock OfMoney(string series, ReadOnlyMemory<double> values) => new MoneyBlock(series, values);
}

internal sealed record MinuteBlock(string Name, ReadOnlyMemory<int> Values) : SeriesBlock(Name);

internal sealed record MoneyBlock(string Name, ReadOnlyMemory<double> Values) : SeriesBlock(Name);
