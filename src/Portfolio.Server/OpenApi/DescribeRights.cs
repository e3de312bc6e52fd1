using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;
using Portfolio.Server.Access;
using Portfolio.Store.Access;

namespace Portfolio.Server.OpenApi;

/// <summary>
/// Says of each operation which rights open it, any one of them (<c>x-rights</c>), from the same requirement that guards the route.
/// Without it any valid key does.
/// </summary>
internal static class DescribeRights
{
    public const string Name = "x-rights";

    public static Task Apply(OpenApiOperation operation, OpenApiOperationTransformerContext context, CancellationToken cancellation)
    {
        var needed = context.Description.ActionDescriptor.EndpointMetadata.OfType<AuthorizationPolicy>()
            .SelectMany(policy => policy.Requirements).OfType<RightRequirement>().ToList();
        if (needed.Count > 0)
            operation.AddExtension(Name, new JsonNodeExtension(new JsonArray([.. Enum.GetValues<Right>().Where(Suffices).Select(Word)])));
        return Task.CompletedTask;

        bool Suffices(Right right) =>
            needed.TrueForAll(each => each.Rights.Any(needs =>
                new Caller("", "", [new Grant(right, Grant.Everywhere)]).HoldsSomewhere(needs, Grant.Everywhere)));
    }

    private static JsonNode Word(Right right) => right.ToString().ToLowerInvariant();
}
