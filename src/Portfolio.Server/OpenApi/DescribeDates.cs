using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>
/// Dates in the query are read as text, so that a wrong one is named among other faults; the description says what they are.
/// </summary>
internal static class DescribeDates
{
    private static readonly string[] Dates = ["asOf", "from", "to"];

    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        foreach (var parameter in operation.Parameters ?? [])
            if (parameter.In == ParameterLocation.Query && Dates.Contains(parameter.Name, StringComparer.Ordinal)
                && parameter.Schema is OpenApiSchema date)
                date.Format = "date";
        return Task.CompletedTask;
    }
}
