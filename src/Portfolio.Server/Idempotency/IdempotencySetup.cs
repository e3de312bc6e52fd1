using Portfolio.Store.Idempotency;

namespace Portfolio.Server.Idempotency;

internal static class IdempotencySetup
{
    public static void AddIdempotency(this IServiceCollection services)
    {
        services.AddSingleton<AnswerStore>();
        services.AddSingleton<WritesAtWork>();
        services.AddSingleton<OnceOnly>();
    }

    /// <summary>Writes of this group that come with a key of their own have their effect once.</summary>
    public static RouteGroupBuilder OnceOnly(this RouteGroupBuilder routes) =>
        routes.AddEndpointFilter((context, next) =>
            context.HttpContext.RequestServices.GetRequiredService<OnceOnly>().InvokeAsync(context, next));
}
