using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using Portfolio.Server.Idempotency;

namespace Portfolio.Server.OpenApi;

/// <summary>Every write can come with a key of its own, and says whether its answer was given before.</summary>
internal static class DescribeIdempotency
{
    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        if (HttpMethods.IsGet(context.Description.HttpMethod ?? HttpMethods.Get))
            return Task.CompletedTask;
        (operation.Parameters ??= []).Add(new OpenApiParameter
        {
            Name = NamedWrite.Header,
            In = ParameterLocation.Header,
            Description = "Sent again within 48 hours with the same request, the first answer is given again and nothing is done twice.",
            Schema = new OpenApiSchema { Type = JsonSchemaType.String, MinLength = 1, MaxLength = 255 },
        });
        foreach (var (status, response) in operation.Responses ?? [])
            if (status.StartsWith('2') && response is OpenApiResponse answer)
                (answer.Headers ??= new Dictionary<string, IOpenApiHeader>()).TryAdd(GivenAnswer.AgainHeader, Again());
        return Task.CompletedTask;
    }

    private static OpenApiHeader Again() => new()
    {
        Description = "true when this answer was given before.",
        Schema = new OpenApiSchema { Type = JsonSchemaType.String },
    };
}
