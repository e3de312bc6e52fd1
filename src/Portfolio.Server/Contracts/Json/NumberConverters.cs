using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Json;

/// <summary>A whole number. Read as any number, so that 1.5 is a fault among others; written without an exponent.</summary>
public sealed class WholeNumberConverter : JsonConverter<double>
{
    private const double Exact = 1L << 53;

    public override double Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options) =>
        reader.TokenType == JsonTokenType.Number ? reader.GetDouble() : throw new JsonException();

    public override void Write(Utf8JsonWriter writer, double value, JsonSerializerOptions options)
    {
        if (value == Math.Truncate(value) && Math.Abs(value) <= Exact)
            writer.WriteNumberValue((long)value);
        else if (double.IsFinite(value))
            writer.WriteNumberValue(value);
        else
            // Never stored; written only to see that it differs from what is.
            writer.WriteNullValue();
    }
}

/// <summary>An exact amount of money, kept with the digits that were sent.</summary>
public sealed class AmountConverter : JsonConverter<decimal>
{
    /// <summary>Stands for a number beyond what a decimal holds; no amount of money comes near.</summary>
    public const decimal TooLarge = decimal.MaxValue;

    public override decimal Read(ref Utf8JsonReader reader, Type type, JsonSerializerOptions options)
    {
        if (reader.TokenType != JsonTokenType.Number)
            throw new JsonException();
        return reader.TryGetDecimal(out var amount) ? amount : TooLarge;
    }

    public override void Write(Utf8JsonWriter writer, decimal value, JsonSerializerOptions options) => writer.WriteNumberValue(value);
}
