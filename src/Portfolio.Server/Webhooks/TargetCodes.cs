using System.ComponentModel;

namespace Portfolio.Server.Webhooks;

/// <summary>Codes of faults in URLs that are to be called. A code never changes meaning.</summary>
internal static class TargetCodes
{
    [Description("The text is not an absolute URL, or too long for one.")]
    public const string Format = "url.format";

    [Description("The URL must begin with https; plain http is for hosts that the operator allows.")]
    public const string Scheme = "url.scheme";

    [Description("The URL holds a user or a password; requests are signed instead.")]
    public const string UserInfo = "url.userinfo";

    [Description("The URL has a fragment (#), which would never be sent.")]
    public const string Fragment = "url.fragment";

    [Description("The URL must use port 443; other ports are for hosts that the operator allows.")]
    public const string Port = "url.port";

    [Description("The URL names a private, local or reserved address.")]
    public const string Address = "url.address";
}
