using System.Text.Json.Nodes;

namespace Portfolio.Server.Updates;

/// <summary>How what was sent comes over what is stored: member by member, each whole; null removes.</summary>
internal static class UpdateMerge
{
    // Reported piece by piece by different systems; everything else means something only as a whole.
    private static readonly HashSet<string> Deeper = new(StringComparer.Ordinal) { "cost", "overhead" };

    /// <param name="stored">Is changed.</param>
    public static void Over(JsonObject stored, JsonObject sent)
    {
        foreach (var (name, value) in sent)
        {
            if (value is JsonObject inner && stored[name] is JsonObject before && Deeper.Contains(name))
                Over(before, inner);
            else if (value is null)
                stored.Remove(name);
            else
                stored[name] = value.DeepClone();
        }
    }

    /// <summary>
    /// The same for an activity: finished work has nothing left, so what is stored as remaining goes unless some is sent.
    /// </summary>
    public static void OverActivity(JsonObject stored, JsonObject sent)
    {
        if (sent["actualFinish"] is not null && !sent.ContainsKey("remaining"))
            stored.Remove("remaining");
        Over(stored, sent);
    }
}
