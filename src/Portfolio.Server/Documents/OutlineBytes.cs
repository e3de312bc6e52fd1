using System.Text;
using Portfolio.Model.Rules;

namespace Portfolio.Server.Documents;

/// <summary>Outlines as they are kept beside contents: a version, then ids, links and needs in their order, lengths before lists.</summary>
internal static class OutlineBytes
{
    // Another version is not read but made again from the content: a change of form needs a new number and no migration.
    private const byte Version = 1;

    public static byte[] Write(ProjectOutline outline)
    {
        using var stream = new MemoryStream();
        using var writer = new BinaryWriter(stream, Encoding.UTF8);
        writer.Write(Version);
        writer.Write(outline.Id);
        Write(writer, outline.Name);
        Write(writer, outline.Programme);
        Write(writer, outline.ActivityIds);
        writer.Write7BitEncodedInt(outline.Links.Count);
        foreach (var link in outline.Links)
            Write(writer, link);
        Write(writer, outline.Needs.Calendars);
        Write(writer, outline.Needs.Drivers);
        writer.Write7BitEncodedInt(outline.Needs.Pools.Count);
        foreach (var (pool, units) in outline.Needs.Pools)
        {
            writer.Write(pool);
            writer.Write(units);
        }
        writer.Flush();
        return stream.ToArray();
    }

    /// <summary>Null when it was written by another version.</summary>
    public static ProjectOutline? Read(byte[] bytes)
    {
        using var reader = new BinaryReader(new MemoryStream(bytes), Encoding.UTF8);
        if (bytes.Length == 0 || reader.ReadByte() != Version)
            return null;
        var (id, name, programme, activities) = (reader.ReadString(), ReadText(reader), ReadText(reader), ReadTexts(reader));
        var links = new OutlineLink[reader.Read7BitEncodedInt()];
        for (var i = 0; i < links.Length; i++)
            links[i] = ReadLink(reader);
        var (calendars, drivers) = (ReadTexts(reader), ReadTexts(reader));
        var pools = new KeyValuePair<string, double>[reader.Read7BitEncodedInt()];
        for (var i = 0; i < pools.Length; i++)
            pools[i] = new(reader.ReadString(), reader.ReadDouble());
        return new ProjectOutline(id, name, programme, activities, links, new ProjectNeeds(calendars, drivers, pools));
    }

    // A predecessor in the same project is one more than its place; 0 says that project and activity follow.
    private static void Write(BinaryWriter writer, OutlineLink link)
    {
        writer.Write7BitEncodedInt(link.Successor);
        writer.Write7BitEncodedInt(link.Entry);
        writer.Write7BitEncodedInt(link.Predecessor + 1);
        if (link.Project is null)
            return;
        writer.Write(link.Project);
        writer.Write(link.Activity!);
    }

    private static OutlineLink ReadLink(BinaryReader reader)
    {
        var (successor, entry, predecessor) =
            (reader.Read7BitEncodedInt(), reader.Read7BitEncodedInt(), reader.Read7BitEncodedInt() - 1);
        return predecessor >= 0
            ? new(successor, entry, predecessor, null, null)
            : new(successor, entry, -1, reader.ReadString(), reader.ReadString());
    }

    private static void Write(BinaryWriter writer, string? text)
    {
        writer.Write(text is not null);
        if (text is not null)
            writer.Write(text);
    }

    private static string? ReadText(BinaryReader reader) => reader.ReadBoolean() ? reader.ReadString() : null;

    private static void Write(BinaryWriter writer, IReadOnlyList<string> texts)
    {
        writer.Write7BitEncodedInt(texts.Count);
        foreach (var text in texts)
            writer.Write(text);
    }

    private static string[] ReadTexts(BinaryReader reader)
    {
        var texts = new string[reader.Read7BitEncodedInt()];
        for (var i = 0; i < texts.Length; i++)
            texts[i] = reader.ReadString();
        return texts;
    }
}
