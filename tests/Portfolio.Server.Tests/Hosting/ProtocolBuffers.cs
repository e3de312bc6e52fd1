namespace Portfolio.Server.Tests.Hosting;

/// <summary>The fields of a message in the wire format of protocol buffers, without its schema.</summary>
internal static class ProtocolBuffers
{
    /// <summary>The values of a field of length-delimited type (text, bytes, messages), in the order in which they stand.</summary>
    public static IEnumerable<ReadOnlyMemory<byte>> Field(this ReadOnlyMemory<byte> message, int number)
    {
        while (message.Length > 0)
        {
            var tag = Number(ref message);
            var value = (tag & 7) switch
            {
                0 => Skipped(ref message),
                1 => Taken(ref message, 8),
                2 => Taken(ref message, (int)Number(ref message)),
                5 => Taken(ref message, 4),
                _ => throw new InvalidDataException($"There is no wire type {tag & 7}."),
            };
            if (tag == (ulong)((number << 3) | 2))
                yield return value;
        }
    }

    private static ReadOnlyMemory<byte> Skipped(ref ReadOnlyMemory<byte> message)
    {
        Number(ref message);
        return default;
    }

    private static ReadOnlyMemory<byte> Taken(ref ReadOnlyMemory<byte> message, int count)
    {
        var value = message[..count];
        message = message[count..];
        return value;
    }

    private static ulong Number(ref ReadOnlyMemory<byte> message)
    {
        ulong number = 0;
        for (var shift = 0; ; shift += 7)
        {
            var part = message.Span[0];
            message = message[1..];
            number |= (ulong)(part & 0x7F) << shift;
            if (part < 0x80)
                return number;
        }
    }
}
