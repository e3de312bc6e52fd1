using System.Net;
using System.Net.Sockets;
using System.Text;

namespace Portfolio.Server.Tests.Webhooks;

/// <summary>A target on this machine that gives every connection the same bytes, whatever it is asked.</summary>
internal sealed class RawTarget : IAsyncDisposable
{
    private readonly TcpListener listener = new(IPAddress.Loopback, 0);
    private readonly byte[] answer;
    private readonly Task listening;

    public RawTarget(string answer)
    {
        this.answer = Encoding.Latin1.GetBytes(answer);
        listener.Start();
        listening = ListenAsync();
    }

    /// <summary>Its address by a name that the tests allow.</summary>
    public string Url => $"http://localhost:{((IPEndPoint)listener.LocalEndpoint).Port}/risk";

    private async Task ListenAsync()
    {
        while (true)
        {
            using var connection = await listener.AcceptTcpClientAsync();
            var stream = connection.GetStream();
            await ReadAsync(stream);
            await stream.WriteAsync(answer);
        }
    }

    // Head and body of what is posted end with the object of the event.
    private static async Task ReadAsync(NetworkStream stream)
    {
        var (text, buffer) = ("", new byte[4096]);
        while (!(text.Contains("\r\n\r\n", StringComparison.Ordinal) && text.EndsWith('}')))
            text += Encoding.Latin1.GetString(buffer, 0, await stream.ReadAsync(buffer));
    }

    public async ValueTask DisposeAsync()
    {
        listener.Stop();
        await listening.ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
    }
}
