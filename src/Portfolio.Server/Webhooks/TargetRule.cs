using System.Net;
using Microsoft.Extensions.Options;

namespace Portfolio.Server.Webhooks;

/// <summary>What is wrong with a URL as a target.</summary>
/// <param name="Code">One of <see cref="TargetCodes"/>.</param>
/// <param name="Message">A sentence that begins with what the URL must be.</param>
internal sealed record TargetFlaw(string Code, string Message);

/// <summary>Which URLs may be called. Names are looked up only when a connection is made, see <see cref="GuardedConnections"/>.</summary>
internal sealed class TargetRule(IOptions<WebhookOptions> options)
{
    public const int Longest = 2_000;

    private readonly IReadOnlySet<string> allowed = options.Value.Allowed();

    public bool Allows(string host) => allowed.Contains(host);

    /// <summary>Everything that is wrong; none when it may be called.</summary>
    public IReadOnlyList<TargetFlaw> Check(string url)
    {
        if (url.Length > Longest || url.Any(char.IsControl) || !Uri.TryCreate(url, UriKind.Absolute, out var uri) || uri.Host.Length == 0)
        {
            return
            [
                new(
                    TargetCodes.Format,
                    $"must be an absolute URL of at most {Longest} characters, such as https://hooks.harbour.example/risk."),
            ];
        }
        return [.. Flaws(uri)];
    }

    private IEnumerable<TargetFlaw> Flaws(Uri uri)
    {
        var known = Allows(HostOf(uri));
        if (uri.Scheme != Uri.UriSchemeHttps && !(known && uri.Scheme == Uri.UriSchemeHttp))
            yield return new(TargetCodes.Scheme, "must begin with https; plain http is for hosts that the operator allows.");
        if (uri.UserInfo.Length > 0)
            yield return new(TargetCodes.UserInfo, "must hold no user or password; requests are signed instead.");
        if (uri.Fragment.Length > 0)
            yield return new(TargetCodes.Fragment, "must have no fragment (#); it would never be sent.");
        if (!known && !uri.IsDefaultPort)
            yield return new(TargetCodes.Port, "must use port 443; other ports are for hosts that the operator allows.");
        if (!known && IPAddress.TryParse(HostOf(uri), out var address) && !PublicAddresses.Contains(address))
            yield return new(TargetCodes.Address, "must not name a private, local or reserved address.");
    }

    /// <summary>The host as names are looked up: letters of other scripts encoded, no brackets.</summary>
    public static string HostOf(Uri uri) => uri.IdnHost.Trim('[', ']');
}
