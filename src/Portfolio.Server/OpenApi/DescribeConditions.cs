using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>Adds the headers of conditional requests and the entity tag of the answer to a route's description.</summary>
internal static class DescribeConditions
{
    /// <summary>A read that answers 304 to a client which has it already.</summary>
    public static RouteHandlerBuilder ReadsConditionally(this RouteHandlerBuilder route) =>
        route.Produces(StatusCodes.Status304NotModified).With("If-None-Match", "Entity tags that the client has; 304 when one is current.");

    /// <summary>A write that says what it replaces.</summary>
    public static RouteHandlerBuilder WritesConditionally(this RouteHandlerBuilder route) =>
        route.With("If-Match", "Entity tag of what is replaced, or *; needed when something is there (428).")
            .With("If-None-Match", "* to create only (412 when something is there).");

    /// <summary>A write of what is always there, which must say what it replaces.</summary>
    public static RouteHandlerBuilder ReplacesConditionally(this RouteHandlerBuilder route) =>
        route.With("If-Match", "Entity tag of what is replaced, or *; needed (428).");

    /// <summary>A write of one part that may also come without conditions.</summary>
    public static RouteHandlerBuilder ChangesConditionally(this RouteHandlerBuilder route) =>
        route.With("If-Match", "Entity tag of what is changed, or *; may be left out.")
            .With("If-None-Match", "* to create only (412 when something is there).");

    /// <summary>A removal, which must say of what.</summary>
    public static RouteHandlerBuilder RemovesConditionally(this RouteHandlerBuilder route) =>
        route.With("If-Match", "Entity tag of what is removed, or *; needed (428).", tagged: false);

    private static RouteHandlerBuilder With(this RouteHandlerBuilder route, string header, string description, bool tagged = true) =>
        route.AddOpenApiOperationTransformer((operation, _, _) =>
        {
            (operation.Parameters ??= []).Add(new OpenApiParameter
            {
                Name = header,
                In = ParameterLocation.Header,
                Description = description,
                Schema = new OpenApiSchema { Type = JsonSchemaType.String },
            });
            foreach (var (_, response) in (operation.Responses ?? []).Where(pair => tagged && pair.Key is "200" or "201" or "304"))
                if (response is OpenApiResponse answer)
                    DescribeHeaders.Add(answer, "ETag", "Strong entity tag of what is answered or written.");
            return Task.CompletedTask;
        });
}
