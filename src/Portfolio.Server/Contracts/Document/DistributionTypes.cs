using System.Text;
using System.Text.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Numbers that a distribution may carry, in the order in which they are written.</summary>
[Flags]
internal enum Numbers : ushort
{
    None = 0,
    Value = 1 << 0,
    Low = 1 << 1,
    Mode = 1 << 2,
    High = 1 << 3,
    LowPercentile = 1 << 4,
    HighPercentile = 1 << 5,
    Weight = 1 << 6,
    Mean = 1 << 7,
    Sd = 1 << 8,
    Min = 1 << 9,
    Max = 1 << 10,
}

/// <summary>
/// One form of a distribution: its word, the members it needs and those it may have. The table is all that reading, writing and the schema
/// know.
/// </summary>
/// <param name="List">Name of its list of pairs, if it has one, with the two members of a pair.</param>
internal sealed record DistributionForm(string Type, Numbers Needs, Numbers May = Numbers.None, PairNames? List = null)
{
    private const Numbers Ends = Numbers.LowPercentile | Numbers.HighPercentile;
    private const Numbers Range = Numbers.Low | Numbers.Mode | Numbers.High;

    /// <summary>Lognormal has two forms; a statement belongs to the first that shares one of its members.</summary>
    public static readonly IReadOnlyList<DistributionForm> All =
    [
        new("constant", Numbers.Value),
        new("uniform", Numbers.Low | Numbers.High),
        new("triangular", Range, Ends),
        new("pert", Range, Ends | Numbers.Weight),
        new("normal", Numbers.Mean | Numbers.Sd, Numbers.Min | Numbers.Max),
        new("lognormal", Numbers.Mean | Numbers.Sd),
        new("lognormal", Numbers.Low | Numbers.High | Ends),
        new("discrete", Numbers.None, List: PairNames.Outcomes),
        new("percentiles", Numbers.None, List: PairNames.Points),
    ];

    public static string Words { get; } = string.Join(", ", All.Select(form => form.Type).Distinct());

    private static readonly (byte[] Utf8, string Text)[] KnownWords =
        [.. All.Select(form => form.Type).Distinct().Select(word => (Encoding.UTF8.GetBytes(word), word))];

    /// <summary>The known type at the reader, without allocating it; null when it is none.</summary>
    public static string? Word(ref Utf8JsonReader reader)
    {
        if (reader.TokenType != JsonTokenType.String)
            return null;
        foreach (var (utf8, text) in KnownWords)
            if (reader.ValueTextEquals(utf8))
                return text;
        return null;
    }

    /// <summary>JSON names of <see cref="Numbers"/>, by position of the bit.</summary>
    public static readonly IReadOnlyList<string> Names =
        ["value", "low", "mode", "high", "lowPercentile", "highPercentile", "weight", "mean", "sd", "min", "max"];

    // Almost always none: asked of every distribution for what is missing and what is too much.
    public static IEnumerable<string> NamesOf(Numbers numbers) =>
        numbers == Numbers.None ? [] : Names.Where((_, bit) => ((int)numbers & (1 << bit)) != 0);

    /// <summary>The form of this type that fits what was sent best; null when there is no such type.</summary>
    public static DistributionForm? Find(string type, Numbers sent)
    {
        DistributionForm? found = null;
        foreach (var form in All)
        {
            if (form.Type != type)
                continue;
            if ((form.Needs & sent) != 0)
                return form;
            found ??= form;
        }
        return found;
    }
}

/// <summary>A list of pairs of numbers: <c>outcomes</c> of value and probability, <c>points</c> of p and value.</summary>
internal sealed record PairNames(string List, string First, string Second)
{
    public static readonly PairNames Outcomes = new("outcomes", "value", "probability");
    public static readonly PairNames Points = new("points", "p", "value");

    public static PairNames? Named(string list) => list == Outcomes.List ? Outcomes : list == Points.List ? Points : null;
}
