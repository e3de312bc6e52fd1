using System.Diagnostics;
using System.Net;
using System.Net.Sockets;
using System.Text;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Attacks;

/// <summary>Bytes to a port as no client library would send them.</summary>
/// <param name="Body">Sent piece by piece until the server has answered or closed the connection.</param>
internal sealed record RawRequest(string Head, IEnumerable<byte[]>? Body = null)
{
    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public static string Line(string method, string target, params string[] headers) =>
        $"{method} {target} HTTP/1.1\r\nHost: localhost\r\nConnection: close\r\nAuthorization: Bearer {PortfolioServer.AdminKey}\r\n"
        + string.Concat(headers.Select(header => header + "\r\n")) + "\r\n";

    /// <summary>A body of stated length.</summary>
    public static RawRequest Json(string method, string target, byte[] body) =>
        new(Line(method, target, "Content-Type: application/json", $"Content-Length: {body.Length}"), [body]);

    /// <summary>
    /// The status that is answered, 0 when the connection is just closed, and how long it took to the first byte of the answer. The server
    /// goes on to take what is still on its way for some seconds before it closes, unless it is told that nothing more will come.
    /// </summary>
    public async Task<(int Status, string Text, TimeSpan Took)> SendAsync(int port)
    {
        var began = Stopwatch.GetTimestamp();
        using var socket = new TcpClient();
        await socket.ConnectAsync(IPAddress.Loopback, port, Cancellation);
        var stream = socket.GetStream();
        var first = TimeSpan.Zero;
        var reading = ReadAsync(stream, () => first = Stopwatch.GetElapsedTime(began));
        try
        {
            await stream.WriteAsync(Encoding.Latin1.GetBytes(Head), Cancellation);
            foreach (var piece in Body ?? [])
            {
                if (first > TimeSpan.Zero)
                    break;
                await stream.WriteAsync(piece, Cancellation);
            }
            if (first > TimeSpan.Zero)
                socket.Client.Shutdown(SocketShutdown.Send);
        }
        catch (Exception closed) when (closed is IOException or SocketException)
        {
            // Closed from the other side.
        }
        var text = await reading;
        var status = text.StartsWith("HTTP/1.1 ", StringComparison.Ordinal) ? int.Parse(text.AsSpan(9, 3), provider: null) : 0;
        return (status, text, first > TimeSpan.Zero ? first : Stopwatch.GetElapsedTime(began));
    }

    private static async Task<string> ReadAsync(NetworkStream stream, Action begins)
    {
        var text = new StringBuilder();
        var buffer = new byte[4096];
        try
        {
            for (int read; (read = await stream.ReadAsync(buffer, Cancellation)) > 0;)
            {
                if (text.Length == 0)
                    begins();
                text.Append(Encoding.UTF8.GetString(buffer, 0, read));
            }
        }
        catch (IOException)
        {
            // Reset: what came before counts.
        }
        return text.ToString();
    }
}
