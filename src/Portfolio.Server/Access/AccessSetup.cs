using System.Threading.RateLimiting;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Authorization;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access.Tokens;
using Portfolio.Server.Hosting;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access;

/// <summary>Keys, rights and the rate of each key. Whatever does not say otherwise needs a valid key.</summary>
internal static class AccessSetup
{
    private const string EitherScheme = "KeyOrToken";

    public static void AddAccess(this IServiceCollection services)
    {
        services.AddAuthentication(EitherScheme)
            .AddPolicyScheme(EitherScheme, null, either => either.ForwardDefaultSelector = context =>
                TokenSetup.IsPresented(context) ? TokenSetup.SchemeName : KeyAuthentication.SchemeName)
            .AddScheme<AuthenticationSchemeOptions, KeyAuthentication>(KeyAuthentication.SchemeName, null)
            .AddTokens();
        services.AddAuthorization(options => options.FallbackPolicy = options.DefaultPolicy);
        services.AddSingleton<IAuthorizationHandler, RightHandler>();
        services.AddSingleton<IAuthorizationMiddlewareResultHandler, RightsOutcome>();
        services.AddRateLimiter(limiter =>
        {
            limiter.GlobalLimiter = PartitionedRateLimiter.Create<HttpContext, string>(OfKey);
            limiter.OnRejected = async (rejected, _) =>
            {
                rejected.HttpContext.Response.Headers.RetryAfter = "1";
                await Problem.TooManyRequests().ExecuteAsync(rejected.HttpContext);
            };
        });
    }

    public static void UseAccess(this WebApplication app)
    {
        app.UseAuthentication();
        app.UseRateLimiter();
        app.UseAuthorization();
    }

    /// <summary>All routes of this group need the right on the portfolio in their address.</summary>
    public static TBuilder Needs<TBuilder>(this TBuilder routes, Right right)
        where TBuilder : IEndpointConventionBuilder =>
        routes.RequireAuthorization(policy => policy.RequireAuthenticatedUser().AddRequirements(new RightRequirement(right)));

    /// <summary>The routes need one of these rights.</summary>
    public static TBuilder NeedsAny<TBuilder>(this TBuilder routes, params Right[] rights)
        where TBuilder : IEndpointConventionBuilder =>
        routes.RequireAuthorization(policy => policy.RequireAuthenticatedUser().AddRequirements(new RightRequirement(rights)));

    // Strangers share one bucket, so that guessing keys is slowed down as well.
    private static RateLimitPartition<string> OfKey(HttpContext context) =>
        RateLimitPartition.GetTokenBucketLimiter(
            (context.User.Identity as CallerIdentity)?.Caller.KeyId ?? "",
            _ =>
            {
                var rate = context.RequestServices.GetRequiredService<IOptions<LimitOptions>>().Value.RequestsPerSecond;
                var tokens = Math.Max(1, rate / 10);
                return new TokenBucketRateLimiterOptions
                {
                    TokenLimit = rate,
                    TokensPerPeriod = tokens,
                    // About a tenth of a second, and exactly the rate.
                    ReplenishmentPeriod = TimeSpan.FromSeconds((double)tokens / rate),
                };
            });
}
