using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>
/// What is sent in is closed: unknown members are refused. What is answered is open: members may be added and clients ignore those they
/// do not know. The generator closes both, so everything that no request body reaches is opened again.
/// </summary>
internal static class OpenAnswers
{
    public static Task Apply(OpenApiDocument document, OpenApiDocumentTransformerContext context, CancellationToken cancellation)
    {
        var schemas = document.Components?.Schemas ?? new Dictionary<string, IOpenApiSchema>();
        var closed = new HashSet<string>(StringComparer.Ordinal);
        foreach (var operation in document.Paths.Values.SelectMany(path => path.Operations?.Values.AsEnumerable() ?? []))
            foreach (var body in operation.RequestBody?.Content?.Values.AsEnumerable() ?? [])
                Close(body.Schema, schemas, closed);
        foreach (var (name, schema) in schemas)
            if (schema is OpenApiSchema answer && !closed.Contains(name))
                answer.AdditionalPropertiesAllowed = true;
        return Task.CompletedTask;
    }

    private static void Close(IOpenApiSchema? schema, IDictionary<string, IOpenApiSchema> schemas, HashSet<string> closed)
    {
        if (schema is OpenApiSchemaReference { Reference.Id: { } name })
        {
            if (!closed.Add(name) || !schemas.TryGetValue(name, out schema))
                return;
        }
        if (schema is not OpenApiSchema whole)
            return;
        IEnumerable<IOpenApiSchema?> inside =
            [.. whole.Properties?.Values ?? [], .. whole.OneOf ?? [], whole.Items, whole.AdditionalProperties];
        foreach (var part in inside)
            Close(part, schemas, closed);
    }
}
