using System.Text.Json.Serialization.Metadata;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Contracts.Json;

/// <summary>What kind of JSON value a place takes, in words.</summary>
internal static class ExpectedKind
{
    public static string At(JsonTypeInfo root, string pointer)
    {
        var type = root;
        foreach (var segment in pointer.Split('/').Skip(1))
        {
            var next = type.Kind == JsonTypeInfoKind.Object
                ? type.Properties.FirstOrDefault(property => property.Name == segment)?.PropertyType
                : type.ElementType;
            if (next is null)
                return "Another kind of value";
            type = root.Options.GetTypeInfo(Nullable.GetUnderlyingType(next) ?? next);
        }
        return Of(type);
    }

    private static string Of(JsonTypeInfo type) => type.Kind switch
    {
        JsonTypeInfoKind.Object or JsonTypeInfoKind.Dictionary => "An object",
        JsonTypeInfoKind.Enumerable => "A list",
        _ when type.Type == typeof(string) => "A text",
        _ when type.Type == typeof(bool) => "true or false",
        _ when type.Type == typeof(double) || type.Type == typeof(decimal) => "A number",
        _ when type.Type == typeof(DistributionJson) => "A number or a distribution object",
        _ when type.Type == typeof(LinkJson) => "An activity's id or a link object",
        _ => "Another kind of value",
    };
}
