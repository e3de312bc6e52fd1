using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>Identifiers, names and tags. A required identifier that is missing (null or "") was reported by who read it.</summary>
internal static class TextRule
{
    private const int IdLength = 64;

    public static bool IsId(string id) =>
        id is { Length: > 0 and <= IdLength } && char.IsAsciiLetterOrDigit(id[0]) && id.AsSpan(1).IndexOfAnyExcept(IdCharacters) < 0;

    /// <summary>The fault of an identifier; null when it is sound.</summary>
    public static Fault? Id(string? id, Func<Place> at) => id is null || IsId(id) ? null : at().Fault(
        RuleCodes.IdFormat,
        $"\"{Shown(id)}\" cannot be an id: 1 to 64 letters, digits, dots, hyphens and underscores are allowed, and the first "
        + "is a letter or a digit.");

    /// <summary>The fault of a name or another short text; null when it is sound.</summary>
    public static Fault? Name(string? text, string what, Func<Place> at)
    {
        if (text is null) return null;
        if (text.Length > Bounds.NameLength)
            return at().Fault(RuleCodes.TextLength, $"The {what} has {text.Length} characters; at most {Bounds.NameLength} are allowed.");
        return text.AsSpan().IndexOfAnyInRange('\u0000', '\u001f') >= 0 || text.AsSpan().IndexOfAnyInRange('\u007f', '\u009f') >= 0
            ? at().Fault(RuleCodes.TextControl, $"The {what} \"{Shown(text)}\" holds a control character, such as a line break or a tab.")
            : null;
    }

    public static IEnumerable<Fault> Tags(IReadOnlyDictionary<string, string> tags, Func<Place> at)
    {
        foreach (var (key, value) in tags)
        {
            if (Name(key, "tag", () => at().Under("tags").UnderKey(key)) is { } ofKey) yield return ofKey;
            if (Name(value, $"tag {Shown(key)}", () => at().Under("tags").UnderKey(key)) is { } ofValue) yield return ofValue;
        }
    }

    /// <summary>Text as it may be repeated in a message: short and on one line.</summary>
    public static string Shown(string text)
    {
        var line = string.Concat(text.Take(Bounds.NameLength).Select(c => char.IsControl(c) ? '\ufffd' : c));
        return text.Length > Bounds.NameLength ? line + "…" : line;
    }

    private static readonly System.Buffers.SearchValues<char> IdCharacters =
        System.Buffers.SearchValues.Create("ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789._-");
}
