using System.Security.Claims;
using Portfolio.Store.Access;

namespace Portfolio.Server.Access;

/// <summary>The key behind a request, as ASP.NET's idea of a user.</summary>
internal sealed class CallerIdentity(Caller caller)
    : ClaimsIdentity([new Claim(ClaimTypes.NameIdentifier, caller.KeyId), new Claim(ClaimTypes.Name, caller.Name)],
        KeyAuthentication.SchemeName)
{
    public Caller Caller { get; } = caller;

    public static ClaimsPrincipal PrincipalOf(Caller caller) => new(new CallerIdentity(caller));
}

internal static class CallerOfPrincipal
{
    /// <summary>The caller; only behind an authorised route.</summary>
    public static Caller Caller(this ClaimsPrincipal user) =>
        (user.Identity as CallerIdentity)?.Caller ?? throw new InvalidOperationException("The route asks for no key.");
}
