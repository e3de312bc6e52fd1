using System.Globalization;
using System.Text.Json;

namespace Portfolio.Server.Contracts.Json;

/// <summary>Goes through JSON token by token and knows the RFC 6901 pointer of each, without allocating one.</summary>
internal ref struct PointerWalk
{
    // Deeper than any limit of ours, so that too deep is told apart from malformed.
    private const int Deepest = 1000;

    private readonly Stack<(int Length, int Index)> open = new();
    private Utf8JsonReader reader;
    private char[] text = new char[256];
    private int length;
    private int owner;
    private int index = -1;

    public PointerWalk(ReadOnlySpan<byte> json) => reader = new Utf8JsonReader(json, new JsonReaderOptions { MaxDepth = Deepest });

    public readonly JsonTokenType Token => reader.TokenType;

    public readonly long Consumed => reader.BytesConsumed;

    public readonly int Depth => reader.CurrentDepth;

    /// <summary>Pointer of the current value, or of the member whose name is current.</summary>
    public readonly ReadOnlySpan<char> Pointer => text.AsSpan(0, length);

    /// <summary>Moves on. Throws as the reader does where the text is no JSON; the pointer then is that of the last good token.</summary>
    public bool Read()
    {
        if (!reader.Read())
            return false;
        switch (reader.TokenType)
        {
            case JsonTokenType.PropertyName:
                length = owner;
                Append(Place.Escape(reader.GetString()!));
                return true;
            case JsonTokenType.EndObject or JsonTokenType.EndArray:
                length = owner;
                (owner, index) = open.Pop();
                return true;
        }
        if (index >= 0)
        {
            length = owner;
            Append((index++).ToString(CultureInfo.InvariantCulture));
        }
        if (reader.TokenType is JsonTokenType.StartObject or JsonTokenType.StartArray)
        {
            open.Push((owner, index));
            owner = length;
            index = reader.TokenType == JsonTokenType.StartArray ? 0 : -1;
        }
        return true;
    }

    /// <summary>Throws <see cref="InvalidOperationException"/> when the current value is a text that cannot be read.</summary>
    public readonly void CheckText()
    {
        if (reader.TokenType == JsonTokenType.String)
            reader.GetString();
    }

    private void Append(string segment)
    {
        var needed = length + 1 + segment.Length;
        if (needed > text.Length)
            Array.Resize(ref text, Math.Max(needed, 2 * text.Length));
        text[length] = '/';
        segment.CopyTo(text.AsSpan(length + 1));
        length = needed;
    }
}
