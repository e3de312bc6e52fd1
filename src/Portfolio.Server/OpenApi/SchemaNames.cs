using System.Text.Json.Serialization.Metadata;
using Microsoft.AspNetCore.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>Names of schemas: those of the contract types without their ending.</summary>
internal static class SchemaNames
{
    private const string Ending = "Json";

    public static string? Of(JsonTypeInfo type)
    {
        var name = OpenApiOptions.CreateDefaultSchemaReferenceId(type);
        return name?.Replace(Ending, "", StringComparison.Ordinal);
    }
}
