using System.Text;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Reference;

namespace Portfolio.Server.Endpoints;

/// <summary>Pages for people who build on the API: made here, without scripts and without anything from elsewhere, open to everybody.</summary>
internal static class ReferenceEndpoints
{
    private const string Policy = "default-src 'none'; style-src 'self'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'";

    private static readonly string Style = ReadStyle();

    public static void AddReference(this IServiceCollection services) => services.AddSingleton<ApiReference>();

    public static void MapReference(this IEndpointRouteBuilder app)
    {
        var pages = app.MapGroup("").AllowAnonymous().ExcludeFromDescription();
        pages.MapGet("/docs", Operations);
        pages.MapGet(Page.StyleAddress, (HttpResponse response) => Answer(response, Style, "text/css; charset=utf-8"));
        pages.MapGet("/problems", (HttpResponse response) => Html(response, ProblemPages.List()));
        pages.MapGet("/problems/{slug}", OneProblem);
    }

    internal static async Task<IResult> Operations(HttpResponse response, ApiReference reference, CancellationToken cancellation) =>
        Html(response, await reference.PageAsync(cancellation));

    internal static IResult OneProblem(string slug, HttpResponse response) =>
        ProblemPages.One(slug) is { } page ? Html(response, page) : Problem.NotFound("There is no such kind of problem; /problems lists them.");

    private static IResult Html(HttpResponse response, string page) => Answer(response, page, "text/html; charset=utf-8");

    private static IResult Answer(HttpResponse response, string text, string type)
    {
        response.Headers.ContentSecurityPolicy = Policy;
        response.Headers.XContentTypeOptions = "nosniff";
        response.Headers["Referrer-Policy"] = "no-referrer";
        response.Headers.CacheControl = "no-cache";
        return TypedResults.Bytes(Encoding.UTF8.GetBytes(text), type, entityTag: EntityTags.OfText(text));
    }

    private static string ReadStyle()
    {
        using var style = new StreamReader(typeof(Page).Assembly.GetManifestResourceStream("Portfolio.Server.Reference.style.css")!);
        return style.ReadToEnd();
    }
}
