using Microsoft.AspNetCore.OpenApi;
using Microsoft.OpenApi;

namespace Portfolio.Server.OpenApi;

/// <summary>What the description says about the API as a whole: its name and how keys are presented.</summary>
internal static class DescribeApi
{
    private static readonly Dictionary<string, string> Tags = new(StringComparer.Ordinal)
    {
        ["Portfolios"] = "What there is for a key to see.",
        ["Keys"] = "Who may do what.",
        ["Audit"] = "Who did what, refused attempts included.",
        ["Document"] = "Settings and projects as the office states them, whole.",
        ["Parts"] = "Settings, projects and activities, each at an address of its own; whatever they touch elsewhere is checked with them.",
        ["Updates"] = "What other systems report, as JSON or as a table.",
        ["Revisions"] = "Every accepted write that changed something.",
        ["Runs"] = "Simulations of one revision, asked for or scheduled.",
        ["Schedule"] = "When the portfolio is run by itself.",
        ["Events"] = "What happened: to poll, or posted signed to those who subscribed.",
        ["Results"] = "Dates, costs and contingency of a run, and how they moved from run to run.",
    };

    public static Task Apply(OpenApiDocument document, OpenApiDocumentTransformerContext context, CancellationToken cancellation)
    {
        document.Info = new OpenApiInfo
        {
            Title = "Portfolio",
            Version = "1",
            Description = "Portfolio-level risk aggregation: finish dates, costs and contingency of many projects at stated confidence.",
            License = new OpenApiLicense { Name = "MIT License", Identifier = "MIT" },
        };
        // The address is the reader's; a generated one would differ from machine to machine.
        document.Servers = [new OpenApiServer { Url = "/" }];
        foreach (var tag in document.Tags ?? new HashSet<OpenApiTag>())
            tag.Description = Tags.GetValueOrDefault(tag.Name ?? "");
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
