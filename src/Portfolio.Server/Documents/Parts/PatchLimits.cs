using System.Text.Json.Nodes;
using System.Text.Json.Serialization.Metadata;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Documents.Parts;

/// <summary>
/// What a merge patch is not taken for, though RFC 7396 says what it would do: a distribution that mixes members from before and from
/// now means something nobody stated, and a list of things with ids would silently replace all of them.
/// </summary>
internal static class PatchLimits
{
    /// <summary>Takes such members out of the patch, so that the rest can still be judged.</summary>
    /// <param name="type">Of the thing that is patched.</param>
    /// <param name="subject">What the thing is called in faults.</param>
    public static List<Fault> Take(JsonObject patch, JsonNode? stored, JsonTypeInfo type, string subject)
    {
        var faults = new List<Fault>();
        Take(patch, stored as JsonObject, type, new Place("", subject), faults);
        return faults;
    }

    private static void Take(JsonObject patch, JsonObject? stored, JsonTypeInfo type, Place owner, List<Fault> faults)
    {
        foreach (var property in type.Properties)
        {
            if (patch[property.Name] is not { } sent)
                continue;
            var (of, before) = (type.Options.GetTypeInfo(property.PropertyType), stored?[property.Name] as JsonObject);
            if (FaultOf(sent, before, of, owner, property.Name) is { } fault)
            {
                faults.Add(fault);
                patch.Remove(property.Name);
            }
            else if (sent is JsonObject inner && of.Kind == JsonTypeInfoKind.Object)
            {
                Take(inner, before, of, owner.Under(property.Name), faults);
            }
        }
    }

    private static Fault? FaultOf(JsonNode sent, JsonObject? before, JsonTypeInfo type, Place owner, string member)
    {
        if (sent is JsonArray && HasIds(type))
        {
            return new Fault(owner.Member(member), owner.Subject, FaultCodes.MergeList,
                $"A patch would replace all of '{member}'; write each at its own address, send 'updates', or put the whole.");
        }
        return type.Type == typeof(DistributionJson) && sent is JsonObject now && before is not null && Mixes(now, before)
            ? new Fault(owner.Member(member), owner.Subject, FaultCodes.MergeMixed,
                $"'{member}' would mix members from before and from now; send it with a null for each member that is to go.")
            : null;
    }

    private static bool Mixes(JsonObject now, JsonObject before) =>
        now.Any(member => member.Value is not null) && before.Any(member => !now.ContainsKey(member.Key));

    private static bool HasIds(JsonTypeInfo list) =>
        list is { Kind: JsonTypeInfoKind.Enumerable, ElementType: { } element }
        && list.Options.GetTypeInfo(element).Properties.Any(property => property.Name == "id");
}
