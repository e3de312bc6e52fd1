using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using Portfolio.Server.Contracts.Csv;

namespace Portfolio.Server.OpenApi;

/// <summary>An answer in CSV is text; the generator would describe it like the JSON beside it.</summary>
internal static class DescribeCsv
{
    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        foreach (var response in operation.Responses?.Values.AsEnumerable() ?? [])
            if (response.Content?.TryGetValue(CsvTable.MediaType, out var csv) == true)
                csv.Schema = new OpenApiSchema { Type = JsonSchemaType.String };
        return Task.CompletedTask;
    }
}
