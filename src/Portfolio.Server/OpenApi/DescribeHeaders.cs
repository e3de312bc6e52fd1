using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>Headers that come with a status wherever it is answered.</summary>
internal static class DescribeHeaders
{
    private static readonly (string Status, string Header, string Description)[] Always =
    [
        ("201", "Location", "Address of what was made."),
        ("202", "Location", "Address of what is at work."),
        ("202", "Retry-After", "Seconds after which to look again."),
        ("401", "WWW-Authenticate", "How keys are presented."),
        ("429", "Retry-After", "Seconds after which to try again."),
        ("503", "Retry-After", "Seconds after which to try again."),
    ];

    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        foreach (var (status, header, description) in Always)
            if (operation.Responses?.GetValueOrDefault(status) is OpenApiResponse answer)
                Add(answer, header, description);
        return Task.CompletedTask;
    }

    /// <summary>A header that every such answer carries.</summary>
    public static void Add(OpenApiResponse answer, string header, string description) =>
        (answer.Headers ??= new Dictionary<string, IOpenApiHeader>()).TryAdd(header, new OpenApiHeader
        {
            Description = description,
            Required = true,
            Schema = new OpenApiSchema { Type = JsonSchemaType.String },
        });
}
