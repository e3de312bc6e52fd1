using System.Text;
using System.Text.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Collects misfits while a distribution or link is read by hand; allocates only when there is one.</summary>
internal struct MisfitList
{
    private List<Misfit>? list;

    public readonly IReadOnlyList<Misfit> All => list ?? (IReadOnlyList<Misfit>)[];

    public void Add(Misfit misfit) => (list ??= []).Add(misfit);

    /// <summary>The number at the reader; null when absent (null) or a misfit.</summary>
    public double? Number(ref Utf8JsonReader reader, string path, string member)
    {
        if (reader.TokenType == JsonTokenType.Null)
            return null;
        if (reader.TokenType != JsonTokenType.Number)
            Add(Misfit.Kind(path, member, "a number"));
        else if (!double.IsFinite(reader.GetDouble()))
            Add(Misfit.NotFinite(path, member));
        else
            return reader.GetDouble();
        reader.Skip();
        return null;
    }

    /// <summary>The text at the reader; null when absent (null) or a misfit.</summary>
    public string? Text(ref Utf8JsonReader reader, string member)
    {
        if (reader.TokenType is JsonTokenType.String or JsonTokenType.Null)
            return reader.GetString();
        Add(Misfit.Kind("", member, "a text"));
        reader.Skip();
        return null;
    }
}

/// <summary>Member names of one object as they are read; a repeated one refuses the request.</summary>
internal struct MemberNames
{
    // Names that distributions and links have; found without allocating.
    private static readonly string[] Known =
    [
        "type", "low", "mode", "high", "value", "lowPercentile", "highPercentile", "mean", "sd", "min", "max", "weight",
        "probability", "p", "outcomes", "points", "activity", "lag",
    ];

    private static readonly byte[][] KnownUtf8 = [.. Known.Select(Encoding.UTF8.GetBytes)];

    private int seen;
    private HashSet<string>? others;

    /// <summary>Takes the name at the reader and moves to its value.</summary>
    public string Next(ref Utf8JsonReader reader)
    {
        var known = 0;
        while (known < Known.Length && !reader.ValueTextEquals(KnownUtf8[known]))
            known++;
        var name = known < Known.Length ? Known[known] : reader.GetString()!;
        var repeated = known < Known.Length ? (seen & (1 << known)) != 0 : !(others ??= []).Add(name);
        if (repeated)
            throw new JsonException();
        if (known < Known.Length)
            seen |= 1 << known;
        reader.Read();
        return name;
    }
}
