using Microsoft.AspNetCore.Authentication.JwtBearer;
using Microsoft.IdentityModel.JsonWebTokens;
using Portfolio.Store;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access.Tokens;

/// <summary>From a token whose signature, issuer, audience and time are good to the caller behind it.</summary>
internal sealed class TokenAuthentication(PersonStore people, string claim, TimeProvider clock)
{
    // What OpenID Connect Core, section 2, allows.
    private const int LongestSubject = 255;
    private const int LongestName = 200;

    /// <summary>How far the issuer's clock may be ahead.</summary>
    public static readonly TimeSpan Skew = TimeSpan.FromMinutes(1);

    public async Task EnterAsync(TokenValidatedContext context)
    {
        if (Presented((JsonWebToken)context.SecurityToken) is { } token
            && await people.EnterAsync(token, context.HttpContext.RequestAborted) is { } caller)
            context.Principal = CallerIdentity.PrincipalOf(caller);
        else
            context.Fail("The token names nobody who may enter.");
    }

    /// <summary>Whatever is wrong with a token means that nobody is known; what is wrong with the storage is said as such.</summary>
    public static Task RefuseAsync(AuthenticationFailedContext context)
    {
        if (context.Exception is not (StoreUnavailableException or OperationCanceledException))
            context.Fail(context.Exception);
        return Task.CompletedTask;
    }

    /// <summary>The end is exact: the SQL conditions know no tolerance either.</summary>
    public bool IsInTime(DateTime? notBefore, DateTime? expires)
    {
        var now = clock.GetUtcNow().UtcDateTime;
        return expires > now && (notBefore is null || notBefore <= now + Skew);
    }

    private PresentedToken? Presented(JsonWebToken token)
    {
        if (token.Subject is not { Length: > 0 and <= LongestSubject } subject || subject.Any(char.IsControl)
            || token.IssuedAt == DateTime.MinValue || token.IssuedAt > clock.GetUtcNow().UtcDateTime + Skew)
            return null;
        var rights = TokenRights.Of(token.Claims.Where(each => each.Type == claim).Select(each => each.Value));
        return new PresentedToken(token.Issuer, subject, NameIn(token, subject), rights, InUtc(token.IssuedAt), InUtc(token.ValidTo));
    }

    private static string NameIn(JsonWebToken token, string subject)
    {
        var name = token.Claims.FirstOrDefault(each => each.Type is "name" && each.Value.Length > 0)?.Value ?? subject;
        var clean = string.Concat(name.Where(letter => !char.IsControl(letter)));
        return clean.Length > LongestName ? clean[..LongestName] : clean;
    }

    private static DateTimeOffset InUtc(DateTime instant) => new(DateTime.SpecifyKind(instant, DateTimeKind.Utc));
}
