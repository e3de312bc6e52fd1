using System.Net;
using System.Net.Sockets;

namespace Portfolio.Server.Webhooks;

/// <summary>
/// Which addresses belong to the public internet (IANA special-purpose registries, RFC 6890). Others must not be called on behalf of
/// those who make subscriptions: they may reach what only this server can.
/// </summary>
internal static class PublicAddresses
{
    private static readonly IPNetwork[] NotPublic4 = Networks(
        "0.0.0.0/8",         // this network
        "10.0.0.0/8",        // private, RFC 1918
        "100.64.0.0/10",     // carrier-grade translation, RFC 6598
        "127.0.0.0/8",       // loopback
        "168.63.129.16/32",  // a cloud's own services, seen from inside it
        "169.254.0.0/16",    // link-local, metadata of clouds
        "172.16.0.0/12",     // private
        "192.0.0.0/24",      // protocol assignments, RFC 6890
        "192.0.2.0/24",      // documentation
        "192.88.99.0/24",    // 6to4 relays
        "192.168.0.0/16",    // private
        "198.18.0.0/15",     // benchmarks
        "198.51.100.0/24",   // documentation
        "203.0.113.0/24",    // documentation
        "224.0.0.0/4",       // multicast
        "240.0.0.0/4");      // reserved, broadcast

    // Only this block is handed out to the internet; loopback, link-local, unique local and multicast addresses lie outside it.
    private static readonly IPNetwork Global6 = IPNetwork.Parse("2000::/3");

    private static readonly IPNetwork[] NotPublic6 = Networks(
        "2001::/23",       // protocol assignments, Teredo among them
        "2001:db8::/32",   // documentation
        "2002::/16",       // 6to4: an IPv4 address inside
        "3fff::/20");      // documentation

    // An IPv4 address in the last four bytes, RFC 6052: what a translator makes of public names.
    private static readonly IPNetwork Translated = IPNetwork.Parse("64:ff9b::/96");

    public static bool Contains(IPAddress address)
    {
        if (address.IsIPv4MappedToIPv6)
            address = address.MapToIPv4();
        if (address.AddressFamily == AddressFamily.InterNetwork)
            return !NotPublic4.Any(network => network.Contains(address));
        if (Translated.Contains(address))
            return Contains(new IPAddress(address.GetAddressBytes().AsSpan(12)));
        return Global6.Contains(address) && !NotPublic6.Any(network => network.Contains(address));
    }

    private static IPNetwork[] Networks(params string[] texts) => [.. texts.Select(text => IPNetwork.Parse(text))];
}
