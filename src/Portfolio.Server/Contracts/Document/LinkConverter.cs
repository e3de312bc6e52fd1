using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Document;

/// <summary>
/// Reads a predecessor by hand, so that everything wrong inside it can be reported with the other faults of the document.
/// </summary>
internal sealed class LinkConverter : JsonConverter<LinkJson>
{
    public override LinkJson Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options) => reader.TokenType switch
    {
        JsonTokenType.String => new LinkJson { Activity = reader.GetString(), Plain = true },
        JsonTokenType.StartObject => ReadObject(ref reader),
        _ => throw new JsonException(),
    };

    private static LinkJson ReadObject(ref Utf8JsonReader reader)
    {
        string? activity = null, type = null;
        double? lag = null;
        var misfits = new MisfitList();
        var seen = new MemberNames();
        while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
        {
            var name = seen.Next(ref reader);
            switch (name)
            {
                case "activity": activity = misfits.Text(ref reader, name); break;
                case "type": type = misfits.Text(ref reader, name); break;
                case "lag": lag = misfits.Number(ref reader, "", name); break;
                default:
                    misfits.Add(Misfit.Unknown("", name, "A predecessor"));
                    reader.Skip();
                    break;
            }
        }
        return new LinkJson { Activity = activity, Type = type, Lag = lag, Misfits = misfits.All };
    }

    public override void Write(Utf8JsonWriter writer, LinkJson link, JsonSerializerOptions options)
    {
        if (link is { Plain: true } or { Type: null, Lag: null })
        {
            writer.WriteStringValue(link.Activity);
            return;
        }
        writer.WriteStartObject();
        writer.WriteString("activity"u8, link.Activity);
        if (link.Type is not null)
            writer.WriteString("type"u8, link.Type);
        if (link.Lag is { } lag)
            writer.WriteNumber("lag"u8, lag);
        writer.WriteEndObject();
    }
}
