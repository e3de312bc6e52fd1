using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>A date of a finish, or an amount of money.</summary>
internal static class DateOrMoneySchema
{
    public static void Write(OpenApiSchema schema)
    {
        schema.Type = null;
        schema.OneOf = [new OpenApiSchema { Type = JsonSchemaType.String, Format = "date" }, DistributionSchema.Number()];
    }
}
