using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Json;

/// <summary>Lists and objects used as maps. A null in one is a value of the wrong kind and refuses the request.</summary>
public static class ReadingLists
{
    /// <summary>Reads each item with its place; an absent list is empty.</summary>
    public static IReadOnlyList<TModel> List<TItem, TModel>(
        this Reading reading, Place owner, string member, IReadOnlyList<TItem>? items, Func<TItem, Place, TModel> read)
    {
        if (items is null or { Count: 0 })
            return [];
        var (list, path) = (new TModel[items.Count], owner.Path);
        for (var i = 0; i < list.Length; i++)
        {
            var at = Place.OfEntry(path, member, i, owner.Subject);
            list[i] = read(items[i] ?? throw JsonRefused.Null(at.Path), at);
        }
        return list;
    }

    /// <summary>A list of texts as it stands.</summary>
    public static IReadOnlyList<string> Texts(this Reading reading, Place owner, string member, IReadOnlyList<string>? items)
    {
        for (var i = 0; i < items?.Count; i++)
            if (items[i] is null)
                throw JsonRefused.Null($"{owner.Path}/{member}/{i}");
        return items ?? [];
    }

    public static IReadOnlyList<DateOnly> Dates(this Reading reading, Place owner, string member, IReadOnlyList<string>? items)
    {
        var list = new Place($"{owner.Path}/{member}", owner.Subject);
        return reading.List(owner, member, items, (text, at) => reading.Date(list, at.Path[(list.Path.Length + 1)..], text)!.Value);
    }

    /// <summary>Words that are unknown are left out of the list.</summary>
    public static IReadOnlyList<T> WordList<T>(
        this Reading reading, Place owner, string member, IReadOnlyList<string>? items, Words<T> words)
        where T : struct, Enum
    {
        var known = new List<T>();
        for (var i = 0; i < items?.Count; i++)
        {
            if (words.Meaning(items[i] ?? throw JsonRefused.Null($"{owner.Path}/{member}/{i}")) is { } meaning)
                known.Add(meaning);
            else
                reading.Faults.Add(new Fault($"{owner.Path}/{member}/{i}", owner.Subject, FaultCodes.ValueUnknown,
                    $"'{member}' may name {string.Join(", ", words.All)}."));
        }
        return known;
    }

    public static IReadOnlyList<double> Numbers(this Reading reading, Place owner, string member, IReadOnlyList<double>? items)
    {
        for (var i = 0; i < items?.Count; i++)
            if (!double.IsFinite(items[i]))
                reading.Faults.Add(new Fault($"{owner.Path}/{member}/{i}", owner.Subject, FaultCodes.NumberNotFinite,
                    "The number is too large."));
        return items ?? [];
    }

    /// <summary>Tags as they stand.</summary>
    public static IReadOnlyDictionary<string, string> Tags(this Reading reading, Place owner, IReadOnlyDictionary<string, string>? tags)
    {
        if (tags is null or { Count: 0 })
            return NoTags;
        foreach (var (key, value) in tags)
            if (value is null)
                throw JsonRefused.Null($"{owner.Member("tags")}/{Place.Escape(key)}");
        return tags;
    }

    private static readonly IReadOnlyDictionary<string, string> NoTags = new Dictionary<string, string>();
}
