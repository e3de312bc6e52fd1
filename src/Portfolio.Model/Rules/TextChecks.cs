using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>Rules of ids and names for what is sent beside the document: keys, for one.</summary>
public static class TextChecks
{
    public static bool IsId(string text) => TextRule.IsId(text);

    /// <summary>The fault of an id; null when it is sound or missing.</summary>
    public static Fault? Id(string? id, string path, string subject) => TextRule.Id(id, () => new Place(path, subject));

    /// <summary>The fault of a name; null when it is sound or missing.</summary>
    /// <param name="what">What it is the name of, for the sentence.</param>
    public static Fault? Name(string? text, string what, string path, string subject) =>
        TextRule.Name(text, what, () => new Place(path, subject));
}
