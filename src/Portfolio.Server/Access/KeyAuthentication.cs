using System.Buffers.Text;
using System.Net.Http.Headers;
using System.Text;
using System.Text.Encodings.Web;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Authorization;
using Microsoft.Extensions.Options;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access;

/// <summary>
/// Who asks, by the key presented as <c>Bearer</c> or as password of <c>Basic</c> (spreadsheets know only that; RFC 6750, RFC 7617).
/// </summary>
internal sealed class KeyAuthentication(
    IOptionsMonitor<AuthenticationSchemeOptions> options, ILoggerFactory logs, UrlEncoder encoder, KeyStore keys)
    : AuthenticationHandler<AuthenticationSchemeOptions>(options, logs, encoder)
{
    public const string SchemeName = "Key";

    // Longer than any key: nothing more is digested for a stranger.
    private const int LongestKey = 512;

    protected override async Task<AuthenticateResult> HandleAuthenticateAsync()
    {
        // What needs no key is told also while keys cannot be looked up: health above all.
        if (Request.Headers.Authorization.Count == 0 || NeedsNone(Context))
            return AuthenticateResult.NoResult();
        if (Presented(Request.Headers.Authorization.ToString()) is not { Length: > 0 and <= LongestKey } key)
            return AuthenticateResult.Fail("The authorization header holds no key.");
        return await keys.AuthenticateAsync(key, Context.RequestAborted) is { } caller
            ? AuthenticateResult.Success(new AuthenticationTicket(CallerIdentity.PrincipalOf(caller), SchemeName))
            : AuthenticateResult.Fail("The key is not known.");
    }

    protected override async Task HandleChallengeAsync(AuthenticationProperties properties)
    {
        Response.Headers.Append(HeaderNames.WWWAuthenticate, "Bearer realm=\"portfolio\"");
        Response.Headers.Append(HeaderNames.WWWAuthenticate, "Basic realm=\"portfolio\", charset=\"UTF-8\"");
        await Problem.Unauthorized().ExecuteAsync(Context);
    }

    protected override Task HandleForbiddenAsync(AuthenticationProperties properties) => Problem.Forbidden().ExecuteAsync(Context);

    /// <summary>Whether what is asked for is served to everybody.</summary>
    public static bool NeedsNone(HttpContext context) => context.GetEndpoint()?.Metadata.GetMetadata<IAllowAnonymous>() is not null;

    private static string? Presented(string header) =>
        !AuthenticationHeaderValue.TryParse(header, out var value) ? null
        : string.Equals(value.Scheme, "Bearer", StringComparison.OrdinalIgnoreCase) ? value.Parameter
        : string.Equals(value.Scheme, "Basic", StringComparison.OrdinalIgnoreCase) ? Password(value.Parameter)
        : null;

    private static string? Password(string? credentials)
    {
        if (credentials is null or { Length: > 2 * LongestKey } || !Base64.IsValid(credentials))
            return null;
        var text = Encoding.UTF8.GetString(Convert.FromBase64String(credentials));
        var colon = text.IndexOf(':', StringComparison.Ordinal);
        return colon < 0 ? null : text[(colon + 1)..];
    }
}
