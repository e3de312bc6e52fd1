using System.Globalization;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Contracts.Json;

/// <summary>Whether a pointer (RFC 6901) leads somewhere in what was sent.</summary>
public static class SentPointers
{
    /// <summary>The pointer itself when its place was sent, otherwise "": then what it speaks of is stored.</summary>
    public static string OrStored(JsonNode? sent, string pointer)
    {
        var here = sent;
        foreach (var segment in pointer.Split('/').Skip(1))
        {
            if (!Step(ref here, segment))
                return "";
        }
        return pointer;
    }

    private static bool Step(ref JsonNode? here, string segment)
    {
        switch (here)
        {
            case JsonObject owner:
                return owner.TryGetPropertyValue(
                    segment.Replace("~1", "/", StringComparison.Ordinal).Replace("~0", "~", StringComparison.Ordinal), out here);
            case JsonArray list when int.TryParse(segment, NumberStyles.None, CultureInfo.InvariantCulture, out var index) && index < list.Count:
                here = list[index];
                return true;
            default:
                return false;
        }
    }
}
