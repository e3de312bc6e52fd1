using System.Globalization;
using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Json;

/// <summary>Instants as RFC 3339 in UTC, always with Z.</summary>
public sealed class InstantConverter : JsonConverter<DateTimeOffset>
{
    public override DateTimeOffset Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options) =>
        reader.TokenType == JsonTokenType.String && reader.TryGetDateTimeOffset(out var instant) ? instant : throw new JsonException();

    public override void Write(Utf8JsonWriter writer, DateTimeOffset value, JsonSerializerOptions options) =>
        writer.WriteStringValue(value.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss.FFFFFFF'Z'", CultureInfo.InvariantCulture));
}
