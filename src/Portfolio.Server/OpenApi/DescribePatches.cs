using Microsoft.OpenApi;
using Portfolio.Server.Endpoints;

namespace Portfolio.Server.OpenApi;

/// <summary>Routes that take a merge patch; nothing else is taken there (415).</summary>
internal static class DescribePatches
{
    public static RouteHandlerBuilder AcceptsPatch(this RouteHandlerBuilder route) =>
        route.Accepts<System.Text.Json.Nodes.JsonObject>(PartBodies.Patch).AddOpenApiOperationTransformer((operation, _, _) =>
        {
            if (operation.RequestBody is OpenApiRequestBody { Content: { } content } body)
            {
                body.Description = "Members to change (RFC 7396): each replaces what is there, objects go on member by member, null removes.";
                content[PartBodies.Patch].Schema = new OpenApiSchema { Type = JsonSchemaType.Object };
            }
            return Task.CompletedTask;
        });
}
