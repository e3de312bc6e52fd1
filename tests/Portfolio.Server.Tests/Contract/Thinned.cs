using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Contract;

/// <summary>Long lists cut down to their beginning and end, so that a large answer costs no more than a small one.</summary>
internal static class Thinned
{
    private const int Kept = 10;

    public static JsonNode? Json(JsonNode? json)
    {
        if (json is JsonArray list)
        {
            if (list.Count > 2 * Kept)
                list.RemoveRange(Kept, list.Count - (2 * Kept));
            foreach (var item in list)
                Json(item);
        }
        else if (json is JsonObject things)
        {
            foreach (var (_, member) in things)
                Json(member);
        }
        return json;
    }
}
