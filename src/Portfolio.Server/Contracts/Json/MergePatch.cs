using System.Text.Json.Nodes;

namespace Portfolio.Server.Contracts.Json;

/// <summary>JSON merge patch (RFC 7396): a member that is sent replaces, objects go on member by member, null removes.</summary>
public static class MergePatch
{
    /// <summary>The algorithm of RFC 7396, section 2. Neither argument is changed; a null node is JSON's null.</summary>
    public static JsonNode? Apply(JsonNode? target, JsonNode? patch)
    {
        if (patch is not JsonObject changes)
            return patch?.DeepClone();
        var result = target is JsonObject owner ? (JsonObject)owner.DeepClone() : [];
        foreach (var (name, value) in changes)
        {
            if (value is null)
                result.Remove(name);
            else
                result[name] = Apply(result[name], value);
        }
        return result;
    }
}
