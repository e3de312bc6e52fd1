using System.Text.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Where the settings and the projects stand in the bytes of a document, so that each can be read on its own.</summary>
internal sealed class DocumentSlices
{
    private readonly ReadOnlyMemory<byte> json;

    private DocumentSlices(ReadOnlyMemory<byte> json) => this.json = json;

    /// <summary>Null when there are none.</summary>
    public ReadOnlyMemory<byte>? Settings { get; private set; }

    public List<ReadOnlyMemory<byte>> Projects { get; } = [];

    /// <summary>Null when this is anything but one object of settings and a list of projects, each an object.</summary>
    /// <exception cref="JsonException">Not JSON, or nested too deeply.</exception>
    public static DocumentSlices? Of(ReadOnlyMemory<byte> json, int maxDepth)
    {
        var slices = new DocumentSlices(json);
        var reader = new Utf8JsonReader(json.Span, new JsonReaderOptions { MaxDepth = maxDepth });
        reader.Read();
        if (reader.TokenType != JsonTokenType.StartObject || !slices.TakeMembers(ref reader))
            return null;
        reader.Read(); // nothing may follow
        return slices;
    }

    private bool TakeMembers(ref Utf8JsonReader reader)
    {
        var withProjects = false;
        while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
        {
            if (Settings is null && reader.ValueTextEquals("settings"u8))
            {
                reader.Read();
                if (reader.TokenType != JsonTokenType.StartObject)
                    return false;
                Settings = Take(ref reader);
            }
            else if (!withProjects && reader.ValueTextEquals("projects"u8))
            {
                withProjects = true;
                if (!TakeProjects(ref reader))
                    return false;
            }
            else
            {
                return false;
            }
        }
        return withProjects;
    }

    private bool TakeProjects(ref Utf8JsonReader reader)
    {
        reader.Read();
        if (reader.TokenType != JsonTokenType.StartArray)
            return false;
        while (reader.Read() && reader.TokenType != JsonTokenType.EndArray)
        {
            if (reader.TokenType != JsonTokenType.StartObject)
                return false;
            Projects.Add(Take(ref reader));
        }
        return true;
    }

    private ReadOnlyMemory<byte> Take(ref Utf8JsonReader reader)
    {
        var start = (int)reader.TokenStartIndex;
        reader.Skip();
        return json[start..(int)reader.BytesConsumed];
    }
}
