using System.Globalization;
using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Results;

/// <summary>A date of a finish, or an amount of a cost: on the wire a string or a number.</summary>
[JsonConverter(typeof(DateOrMoneyConverter))]
public readonly record struct DateOrMoney
{
    public DateOrMoney(DateOnly date) => Date = date;

    public DateOrMoney(decimal money) => Money = money;

    public DateOnly? Date { get; }

    public decimal? Money { get; }

    public override string ToString() =>
        Date?.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) ?? Money?.ToString(CultureInfo.InvariantCulture) ?? "";
}

internal sealed class DateOrMoneyConverter : JsonConverter<DateOrMoney>
{
    private const string Iso = "yyyy-MM-dd";

    public override DateOrMoney Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options) =>
        reader.TokenType == JsonTokenType.Number
            ? new(reader.GetDecimal())
            : new(DateOnly.ParseExact(reader.GetString()!, Iso, CultureInfo.InvariantCulture));

    public override void Write(Utf8JsonWriter writer, DateOrMoney value, JsonSerializerOptions options)
    {
        if (value.Money is { } money) writer.WriteNumberValue(money);
        else writer.WriteStringValue(value.ToString());
    }
}
