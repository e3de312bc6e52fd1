using System.Numerics;
using System.Text.Json;
using System.Text.Json.Serialization;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Document;

/// <summary>
/// Reads a distribution by hand, so that an unknown type and missing, unknown and non-numeric members can be reported with the other
/// faults of the document. Only a value that is neither a number nor an object, or a repeated member, refuses the request at once.
/// </summary>
internal sealed class DistributionConverter : JsonConverter<DistributionJson>
{
    public override DistributionJson Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options) => reader.TokenType switch
    {
        JsonTokenType.Number => Plain(reader.GetDouble()),
        JsonTokenType.StartObject => new DistributionDraft().Read(ref reader),
        _ => throw new JsonException(),
    };

    private static DistributionJson Plain(double value) => new(
        null, Numbers.Value, [value], null,
        double.IsFinite(value) ? [] : [new Misfit("", FaultCodes.NumberNotFinite, "The number is too large to be a number here.")]);

    public override void Write(Utf8JsonWriter writer, DistributionJson distribution, JsonSerializerOptions options)
    {
        if (distribution.Misfits.Count > 0)
        {
            // Never stored; written only to see that it differs from what is.
            writer.WriteNullValue();
            return;
        }
        if (distribution.Type is null)
        {
            writer.WriteNumberValue(distribution[Numbers.Value]!.Value);
            return;
        }
        writer.WriteStartObject();
        writer.WriteString("type"u8, distribution.Type);
        for (var rest = (uint)distribution.Sent; rest != 0; rest &= rest - 1)
        {
            var bit = BitOperations.TrailingZeroCount(rest);
            writer.WriteNumber(DistributionForm.Names[bit], distribution[(Numbers)(1 << bit)]!.Value);
        }
        if (DistributionForm.Find(distribution.Type, distribution.Sent)?.List is { } names)
            WritePairs(writer, names, distribution.Pairs!);
        writer.WriteEndObject();
    }

    private static void WritePairs(Utf8JsonWriter writer, PairNames names, IReadOnlyList<(double First, double Second)> pairs)
    {
        writer.WriteStartArray(names.List);
        foreach (var (first, second) in pairs)
        {
            writer.WriteStartObject();
            writer.WriteNumber(names.First, first);
            writer.WriteNumber(names.Second, second);
            writer.WriteEndObject();
        }
        writer.WriteEndArray();
    }
}
