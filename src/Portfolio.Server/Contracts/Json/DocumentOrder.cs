using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Json;

/// <summary>Puts faults in the order in which their places stand in the JSON that was sent; the whole ("") first.</summary>
public static class DocumentOrder
{
    public static IReadOnlyList<Fault> Sort(IReadOnlyList<Fault> faults, ReadOnlySpan<byte> json)
    {
        json = json.StartsWith("\uFEFF"u8) ? json[3..] : json;
        // A pointer that leads nowhere (a member that was not sent) stands with its nearest owner that was.
        var places = new Dictionary<string, int>(StringComparer.Ordinal);
        foreach (var fault in faults)
            for (var path = fault.Path; path.Length > 0 && places.TryAdd(path, -1); path = path[..path.LastIndexOf('/')])
            {
            }
        Number(places, json);
        return [.. faults.OrderBy(fault => PlaceOf(fault.Path, places))];
    }

    private static void Number(Dictionary<string, int> places, ReadOnlySpan<byte> json)
    {
        var lookup = places.GetAlternateLookup<ReadOnlySpan<char>>();
        var walk = new PointerWalk(json);
        for (var token = 1; walk.Read(); token++)
            if (lookup.TryGetValue(walk.Pointer, out var number) && number < 0)
                lookup[walk.Pointer] = token;
    }

    private static int PlaceOf(string path, Dictionary<string, int> places)
    {
        for (; path.Length > 0; path = path[..path.LastIndexOf('/')])
            if (places[path] is > 0 and var number)
                return number;
        return 0;
    }
}
