using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>
/// What parameters mean that many routes share: comments of handlers do not reach those that come in a record, and need not repeat these.
/// </summary>
internal static class DescribeParameters
{
    private static readonly Dictionary<string, string> Shared = new(StringComparer.Ordinal)
    {
        ["portfolio"] = "Id of the portfolio.",
        ["programme"] = "Id of the programme.",
        ["project"] = "Id of the project.",
        ["activity"] = "Id of the activity.",
        ["number"] = "Number of the revision.",
        ["run"] = "Id of the run, or 'latest' where figures are read: the point of the series with the greatest date.",
        ["format"] = "'json' or 'csv'; left out, the header Accept decides.",
        ["note"] = "Kept with the revision; at most 500 characters.",
        ["revision"] = "A revision; left out: the newest.",
    };

    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        var ofRuns = operation.Parameters?.Any(parameter => parameter.Name == "run") == true;
        foreach (var parameter in operation.Parameters ?? [])
            if (parameter is OpenApiParameter { Description: null or "", Name: { } name } plain)
                plain.Description = name == "asOf" ? AsOf(ofRuns) : Shared.GetValueOrDefault(name);
        return Task.CompletedTask;
    }

    private static string AsOf(bool ofRuns) => ofRuns
        ? "With 'latest': the run that stands for this date or the nearest earlier one."
        : "What was current at the end of this local date.";
}
