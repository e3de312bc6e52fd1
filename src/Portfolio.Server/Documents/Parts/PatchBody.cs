using System.Text.Json;
using System.Text.Json.Nodes;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Documents.Parts;

/// <summary>Changes to what stands at the address, as a merge patch (RFC 7396).</summary>
internal sealed class PatchBody<T>(ReadOnlyMemory<byte> json, DocumentReader reader, PartType<T> type, string id, string subject)
    : PartBody<T>(json, type, id, subject)
{
    private JsonNode? sent;

    public override bool NeedsStored => true;

    public override PartContent<T> Over(byte[]? stored)
    {
        sent ??= reader.ReadAny(Json.Span) is { ValueKind: JsonValueKind.Object } patch ? JsonObject.Create(patch) : throw NoObject();
        var target = JsonNode.Parse(stored!);
        var changes = sent!.DeepClone().AsObject();
        var faults = PatchLimits.Take(changes, target, Type.Json, Subject);
        var content = Read(MergePatch.Apply(target, changes)!);
        return new PartContent<T>(Addressed(content, faults), faults, Place);
    }

    private string Place(string path) => SentPointers.OrStored(sent, path);

    private T Read(JsonNode merged)
    {
        try
        {
            return Type.Read(reader, JsonSerializer.SerializeToUtf8Bytes(merged, Type.Json.Options.GetTypeInfo(typeof(JsonNode))));
        }
        catch (JsonRefused refused)
        {
            // Line and column would be those of the merged text, which nobody sent.
            throw new JsonRefused(refused.Fault with { Path = Place(refused.Fault.Path) });
        }
    }

    // RFC 7396 lets any value take the place of the whole; none but an object can stand here.
    private static JsonRefused NoObject() =>
        new(new Fault("", "", FaultCodes.MemberKind, "An object with the members to change is expected here."));
}
