using System.Runtime.InteropServices;
using System.Text.Json;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Documents.Parts;

/// <summary>
/// What the right to submit does not reach: of an activity its demands and drivers, of a project everything but the status date and what
/// overhead has cost so far (activities are submitted at their own addresses).
/// </summary>
internal static class SubmitLimits
{
    /// <param name="stored">Canonical bytes; null when there is no such project yet.</param>
    public static Problem? OfProject(string project, byte[]? stored, PartContent<ProjectJson> after) =>
        Refusal(FaultsOfProject(project, stored, after));

    public static Problem? OfActivity(string subject, byte[]? stored, PartContent<ActivityJson> after) =>
        Refusal(FaultsOfActivity(subject, stored, after));

    public static IReadOnlyList<Fault> FaultsOfProject(string project, byte[]? stored, PartContent<ProjectJson> after)
    {
        var changed = Changed(stored, DocumentReader.Bytes(after.Content));
        return Faults(project, after.Place, changed.Where(member => member is not ("/statusDate" or "/overhead/actual")));
    }

    public static IReadOnlyList<Fault> FaultsOfActivity(string subject, byte[]? stored, PartContent<ActivityJson> after)
    {
        var changed = Changed(stored, DocumentReader.Bytes(after.Content));
        return Faults(subject, after.Place, changed.Where(member => member is "/demands" or "/drivers"));
    }

    private static Problem? Refusal(IReadOnlyList<Fault> faults) => faults.Count == 0 ? null : Problem.Forbidden(faults);

    private static Fault[] Faults(string subject, Func<string, string> place, IEnumerable<string> members) =>
    [
        .. members.Select(member => new Fault(
            place(member), subject, FaultCodes.RightMissing, $"To change '{member[1..]}' of {subject} the right 'manage' is needed.")),
    ];

    /// <summary>Members that differ; of overhead, which is only partly reached, the members in it.</summary>
    private static IEnumerable<string> Changed(byte[]? stored, byte[] after)
    {
        var (old, now) = (Parse(stored ?? "{}"u8.ToArray()), Parse(after));
        return Changed(old, now, "").SelectMany(member =>
            member == "/overhead" ? Changed(Member(old, "overhead"), Member(now, "overhead"), member) : [member]);
    }

    private static IEnumerable<string> Changed(JsonElement old, JsonElement now, string owner) =>
        Names(old).Union(Names(now), StringComparer.Ordinal)
            .Where(name => !Raw(Member(old, name)).SequenceEqual(Raw(Member(now, name))))
            .Select(name => $"{owner}/{name}");

    private static JsonElement Parse(byte[] json)
    {
        using var document = JsonDocument.Parse(json);
        return document.RootElement.Clone();
    }

    private static IEnumerable<string> Names(JsonElement owner) =>
        owner.ValueKind == JsonValueKind.Object ? owner.EnumerateObject().Select(member => member.Name) : [];

    private static JsonElement Member(JsonElement owner, string name) =>
        owner.ValueKind == JsonValueKind.Object && owner.TryGetProperty(name, out var member) ? member : default;

    private static ReadOnlySpan<byte> Raw(JsonElement value) =>
        value.ValueKind == JsonValueKind.Undefined ? [] : JsonMarshal.GetRawUtf8Value(value);
}
