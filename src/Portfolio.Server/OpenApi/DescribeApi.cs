using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>What the description says about the API as a whole: its name and how keys are presented.</summary>
internal static class DescribeApi
{
    public static Task Apply(OpenApiDocument document, OpenApiDocumentTransformerContext context, CancellationToken cancellation)
    {
        document.Info = new OpenApiInfo
        {
            Title = "Portfolio",
            Version = "1",
            Description = "Portfolio-level risk aggregation: finish dates, costs and contingency of many projects at stated confidence.",
        };
        // The address is the reader's; a generated one would differ from machine to machine.
        document.Servers = [];
        document.Components ??= new OpenApiComponents();
        document.Components.SecuritySchemes = new Dictionary<string, IOpenApiSecurityScheme>
        {
            ["bearer"] = new OpenApiSecurityScheme { Type = SecuritySchemeType.Http, Scheme = "bearer", Description = "A key." },
            ["basic"] = new OpenApiSecurityScheme
            {
                Type = SecuritySchemeType.Http, Scheme = "basic", Description = "A key as password; any user name.",
            },
        };
        document.Security =
        [
            new OpenApiSecurityRequirement { [new OpenApiSecuritySchemeReference("bearer", document)] = [] },
            new OpenApiSecurityRequirement { [new OpenApiSecuritySchemeReference("basic", document)] = [] },
        ];
        return Task.CompletedTask;
    }
}
