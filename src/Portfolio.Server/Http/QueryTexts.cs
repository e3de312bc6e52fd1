using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>No text that is kept holds U+0000, and PostgreSQL does not even look for one: a query with it names nothing.</summary>
internal static class QueryTexts
{
    /// <summary>Refuses such queries (400), as the web server refuses such paths.</summary>
    public static RouteGroupBuilder HoldsToTexts(this RouteGroupBuilder routes) => routes.AddEndpointFilter((context, next) =>
        context.HttpContext.Request.Query.Any(pair => Holds(pair.Key) || pair.Value.Any(Holds))
            ? ValueTask.FromResult<object?>(Problem.BadRequest("The query holds the character U+0000, which no text here has."))
            : next(context));

    private static bool Holds(string? text) => text?.Contains('\0', StringComparison.Ordinal) == true;
}
