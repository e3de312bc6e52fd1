using Portfolio.Server.Audit;
using Portfolio.Server.Contracts;

namespace Portfolio.Server.Problems;

/// <summary>Every refusal becomes a problem document: those of handlers, of exceptions and of the framework's bare status codes.</summary>
internal static class ProblemSetup
{
    public static void AddProblems(this IServiceCollection services)
    {
        services.Configure<RouteHandlerOptions>(options => options.ThrowOnBadRequest = true);
        services.AddSingleton<RefusedWrites>();
        services.AddExceptionHandler<ExceptionProblems>();
    }

    public static void UseProblems(this IApplicationBuilder app)
    {
        app.UseExceptionHandler(_ => { });
        app.UseStatusCodePages(context => OfStatus(context.HttpContext.Response.StatusCode).ExecuteAsync(context.HttpContext));
    }

    /// <summary>Tells the API's description which problems the routes of a group can answer with.</summary>
    public static TBuilder Refuses<TBuilder>(this TBuilder routes, params int[] statuses)
        where TBuilder : IEndpointConventionBuilder
    {
        foreach (var status in statuses)
            routes.WithMetadata(new ProducesResponseTypeMetadata(status, typeof(ProblemJson), [Problem.MediaType]));
        return routes;
    }

    private static Problem OfStatus(int status) => status switch
    {
        404 => Problem.NotFound(),
        405 => new Problem(405, "method-not-allowed", "The method is not served here", "The header Allow names those that are."),
        406 => new Problem(406, "not-acceptable", "No such representation"),
        415 => new Problem(415, "unsupported-media-type", "The body's media type is not taken here"),
        400 => Problem.BadRequest("The request is not well formed."),
        _ => new Problem(status, ProblemKinds.Other, "The request was refused"),
    };
}
