using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Authentication.JwtBearer;
using Microsoft.Extensions.Options;
using Microsoft.IdentityModel.Tokens;
using Portfolio.Server.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access.Tokens;

/// <summary>Tokens of one configured issuer, beside keys (RFC 7519, OpenID Connect Discovery). Everything about them is pinned.</summary>
internal static class TokenSetup
{
    public const string SchemeName = "Token";

    public static AuthenticationBuilder AddTokens(this AuthenticationBuilder authentication)
    {
        authentication.AddJwtBearer(SchemeName, _ => { });
        authentication.Services.AddOptions<JwtBearerOptions>(SchemeName)
            .Configure<IOptions<OidcOptions>, PersonStore, TimeProvider>((bearer, oidc, people, clock) =>
                Pin(bearer, oidc.Value, new TokenAuthentication(people, oidc.Value.Claim, clock)));
        return authentication;
    }

    /// <summary>A token has two dots, which no text of a key made here has (RFC 7515, section 7.1).</summary>
    public static bool IsPresented(HttpContext context) =>
        context.Request.Headers.Authorization.ToString() is var header
        && header.StartsWith("Bearer ey", StringComparison.OrdinalIgnoreCase) && header.Count(letter => letter == '.') == 2
        && !KeyAuthentication.NeedsNone(context)
        && context.RequestServices.GetRequiredService<IOptions<OidcOptions>>().Value.IsOn;

    private static void Pin(JwtBearerOptions bearer, OidcOptions oidc, TokenAuthentication tokens)
    {
        bearer.Authority = oidc.Discovery;
        bearer.MapInboundClaims = false;
        // Refusals look the same whatever was presented.
        bearer.ForwardChallenge = KeyAuthentication.SchemeName;
        bearer.ForwardForbid = KeyAuthentication.SchemeName;
        bearer.TokenValidationParameters = new TokenValidationParameters
        {
            ValidIssuer = string.IsNullOrEmpty(oidc.Issuer) ? null : oidc.Issuer,
            ValidAudience = oidc.Audience,
            ValidAlgorithms = oidc.AlgorithmList,
            ValidateIssuerSigningKey = true,
            RequireSignedTokens = true,
            RequireExpirationTime = true,
            LifetimeValidator = (notBefore, expires, _, _) => tokens.IsInTime(notBefore, expires),
        };
        bearer.Events = new JwtBearerEvents
        {
            OnTokenValidated = tokens.EnterAsync,
            OnAuthenticationFailed = TokenAuthentication.RefuseAsync,
        };
    }
}
