namespace Portfolio.Server.Http;

/// <summary>HEAD wherever GET is served: the same headers and no body (RFC 9110, section 9.3.2).</summary>
internal static class Heads
{
    private static readonly object Asked = new();

    /// <summary>Comes before routing, which then finds the route of GET.</summary>
    public static void UseHeads(this IApplicationBuilder app) => app.Use(async (http, next) =>
    {
        if (!HttpMethods.IsHead(http.Request.Method))
        {
            await next(http);
            return;
        }
        var body = http.Response.Body;
        (http.Request.Method, http.Response.Body, http.Items[Asked]) = (HttpMethods.Get, Stream.Null, Asked);
        try
        {
            await next(http);
        }
        finally
        {
            (http.Request.Method, http.Response.Body) = (HttpMethods.Head, body);
        }
    });

    /// <summary>True when only the headers are wanted, which a stream without end must know.</summary>
    public static bool AsksForHead(this HttpContext http) => http.Items.ContainsKey(Asked);
}
