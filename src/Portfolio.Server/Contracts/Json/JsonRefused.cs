using System.Text;
using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Json;

/// <summary>
/// A body that is not JSON, or JSON with an unknown or repeated member or a value of the wrong kind (400). Names the first place.
/// </summary>
/// <param name="line">From 1, where known.</param>
/// <param name="column">In characters from 1, where known.</param>
public sealed class JsonRefused(Fault fault, int? line = null, int? column = null) : Exception(fault.Message)
{
    public Fault Fault { get; } = fault;

    public int? Line { get; } = line;

    public int? Column { get; } = column;

    /// <summary>True when it was a table, in which line and column stand for a path.</summary>
    public bool IsTable { get; private init; }

    /// <summary>A table that cannot be read from this line on.</summary>
    public static JsonRefused Table(string why, int line) =>
        new(new Fault("", "", FaultCodes.TableMalformed, why), line, 1) { IsTable = true };

    public static JsonRefused Null(string path) =>
        new(new Fault(path, "", FaultCodes.MemberKind, "A null cannot stand here."));

    /// <summary>Finds again what stopped the serializer, to say it in our own words: its messages name types of the program.</summary>
    public static JsonRefused From(ReadOnlySpan<byte> json, JsonException refused, JsonTypeInfo type, int maxDepth)
    {
        var stop = Offset(json, refused);
        // What the serializer's reader has found, be it broken or too deep, lies behind the stop: reading on comes to it.
        var isUnreadable = refused.InnerException is JsonException;
        var walk = new PointerWalk(json);
        var members = new Stack<HashSet<string>>();
        try
        {
            while (walk.Read())
            {
                var opens = walk.Token is JsonTokenType.StartObject or JsonTokenType.StartArray;
                if (opens && walk.Depth >= maxDepth)
                    return At(json, walk, FaultCodes.JsonDepth, $"The JSON is nested deeper than {maxDepth} levels.");
                if (walk.Token == JsonTokenType.StartObject)
                    members.Push(new HashSet<string>(StringComparer.Ordinal));
                else if (walk.Token == JsonTokenType.EndObject)
                    members.Pop();
                else if (walk.Token == JsonTokenType.PropertyName && !members.Peek().Add(walk.Pointer.ToString()))
                    return At(json, walk, FaultCodes.MemberDuplicate, "The member appears twice in this object.");
                if (walk.Consumed >= stop && !isUnreadable)
                {
                    var found = AtStop(json, walk, type);
                    // Text cut short may be of another kind as well: reading on then throws.
                    if (json[(int)walk.Consumed..].Trim(" \t\r\n,"u8).IsEmpty)
                        walk.Read();
                    return found;
                }
            }
        }
        catch (Exception malformed) when (malformed is JsonException or InvalidOperationException)
        {
            // InvalidOperationException: a text that is not valid UTF-8 or half a surrogate pair.
            stop = malformed is JsonException syntax ? Offset(json, syntax) : walk.Consumed;
        }
        return Malformed(json, walk, stop);
    }

    /// <summary>
    /// Refuses names and texts that are not valid UTF-8 or hold half a surrogate pair: JSON that is kept as it came, not read into a type,
    /// fails only where they are used.
    /// </summary>
    public static void WhereTextsAreBroken(ReadOnlySpan<byte> json)
    {
        var walk = new PointerWalk(json);
        try
        {
            while (walk.Read())
                walk.CheckText();
        }
        catch (InvalidOperationException)
        {
            throw Malformed(json, walk, walk.Consumed);
        }
    }

    private static JsonRefused Malformed(ReadOnlySpan<byte> json, PointerWalk walk, long stop)
    {
        var (line, column) = Position(json, stop);
        return new JsonRefused(
            new Fault(walk.Pointer.ToString(), "", FaultCodes.JsonMalformed,
                $"The text is not valid JSON at line {line}, column {column}."),
            line, column);
    }

    private static JsonRefused AtStop(ReadOnlySpan<byte> json, PointerWalk walk, JsonTypeInfo type) =>
        walk.Token == JsonTokenType.PropertyName
        ? At(json, walk, FaultCodes.MemberUnknown, "There is no such member here.")
        : At(json, walk, FaultCodes.MemberKind, $"{ExpectedKind.At(type, walk.Pointer.ToString())} is expected here.");

    private static JsonRefused At(ReadOnlySpan<byte> json, PointerWalk walk, string code, string message)
    {
        var (line, column) = Position(json, walk.Consumed);
        return new JsonRefused(new Fault(walk.Pointer.ToString(), "", code, message), line, column);
    }

    private static long Offset(ReadOnlySpan<byte> json, JsonException exception)
    {
        var start = 0;
        for (var line = 0L; line < exception.LineNumber; line++)
        {
            var end = json[start..].IndexOf((byte)'\n');
            if (end < 0)
                break;
            start += end + 1;
        }
        return Math.Min(json.Length, start + (exception.BytePositionInLine ?? 0));
    }

    private static (int Line, int Column) Position(ReadOnlySpan<byte> json, long offset)
    {
        var before = json[..(int)offset];
        var start = before.LastIndexOf((byte)'\n') + 1;
        return (before.Count((byte)'\n') + 1, Encoding.UTF8.GetCharCount(before[start..]) + 1);
    }
}
