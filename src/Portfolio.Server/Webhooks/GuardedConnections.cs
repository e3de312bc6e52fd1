using System.Net;
using System.Net.Sockets;

namespace Portfolio.Server.Webhooks;

/// <summary>Looks up the addresses of a host.</summary>
internal delegate Task<IPAddress[]> HostLookup(string host, CancellationToken cancellation);

/// <summary>No address of the host may be called.</summary>
internal sealed class TargetRefused() : Exception("The host's address is private, local or reserved; the operator has not allowed it.");

/// <summary>
/// Makes connections to public addresses alone. The name is looked up once, here, and the connection goes to the very address that was
/// checked: an answer that changes in between changes nothing.
/// </summary>
internal sealed class GuardedConnections(TargetRule rule, HostLookup lookup)
{
    /// <summary>For <see cref="SocketsHttpHandler.ConnectCallback"/>.</summary>
    public async ValueTask<Stream> ConnectAsync(SocketsHttpConnectionContext asked, CancellationToken cancellation)
    {
        var addresses = await AddressesAsync(asked.DnsEndPoint.Host, cancellation);
        SocketException? failed = null;
        foreach (var address in addresses)
        {
            var socket = new Socket(address.AddressFamily, SocketType.Stream, ProtocolType.Tcp) { NoDelay = true };
            try
            {
                await socket.ConnectAsync(address, asked.DnsEndPoint.Port, cancellation);
                return new NetworkStream(socket, ownsSocket: true);
            }
            catch (Exception failure)
            {
                socket.Dispose();
                if (failure is not SocketException next)
                    throw;
                failed = next;
            }
        }
        throw failed ?? new SocketException((int)SocketError.HostNotFound);
    }

    /// <summary>The addresses of a host that may be called.</summary>
    /// <exception cref="TargetRefused">It has addresses, but none of these.</exception>
    public async Task<IReadOnlyList<IPAddress>> AddressesAsync(string host, CancellationToken cancellation)
    {
        var found = IPAddress.TryParse(host.Trim('[', ']'), out var literal) ? [literal] : await lookup(host, cancellation);
        if (rule.Allows(host.Trim('[', ']')))
            return found;
        IPAddress[] open = [.. found.Where(PublicAddresses.Contains)];
        return open.Length > 0 || found.Length == 0 ? open : throw new TargetRefused();
    }
}
