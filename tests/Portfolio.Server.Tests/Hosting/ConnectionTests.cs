using System.Net.Sockets;
using System.Text;
using Portfolio.Server.Tests.Jobs;

namespace Portfolio.Server.Tests.Hosting;

/// <summary>What only a real connection shows: how it is opened, how slowly it may bring its bytes, what HEAD leaves out.</summary>
public sealed class ConnectionTests
{
    private const string Key = $"Authorization: Bearer {PortfolioServer.AdminKey}";

    [Fact]
    public async Task ConnectionsThatBringNothingOrTooManyAreEnded()
    {
        var directory = Directory.CreateTempSubdirectory("portfolio-");
        try
        {
            using var server = await ServerProcess.StartAsync(
                directory.FullName, ("Limits__Connections", "6"), ("Limits__HeaderTime", "00:00:03"), ("Limits__BodyBytesPerSecond", "1000"));
            var address = server.Client.BaseAddress!;

            var head = await SayAsync(address, $"HEAD /v1/portfolios HTTP/1.1\r\nHost: x\r\n{Key}\r\nConnection: close\r\n\r\n");
            Assert.StartsWith("HTTP/1.1 200 ", head);
            Assert.EndsWith("\r\n\r\n", head);

            var nameless = await SayAsync(address, $"DELETE /v1/portfolios/p/runs/r HTTP/1.1\r\nHost: x\r\n{Key}\r\nIdempotency-Key:\r\nConnection: close\r\n\r\n");
            Assert.StartsWith("HTTP/1.1 400 ", nameless);
            Assert.Contains("/problems/idempotency-key-invalid", nameless);

            // Half a header, and a body that never comes.
            Assert.StartsWith("HTTP/1.1 408 ", await SayAsync(address, "GET /health/live HTTP/1.1\r\nHost:"));
            var slow = await SayAsync(address, $"PUT /v1/portfolios/p/document HTTP/1.1\r\nHost: x\r\n{Key}\r\nContent-Type: application/json\r\nContent-Length: 9000\r\n\r\n{{");
            Assert.StartsWith("HTTP/1.1 408 ", slow);
            Assert.Contains("/problems/too-slow", slow);

            var held = new List<TcpClient>();
            for (var i = 0; i < 10; i++)
                held.Add(await ConnectAsync(address));
            // Those beyond the limit are closed without a word.
            Assert.Equal(0, await held[^1].GetStream().ReadAsync(new byte[1], TestContext.Current.CancellationToken));
            held.ForEach(connection => connection.Dispose());
        }
        finally
        {
            directory.Delete(recursive: true);
        }
    }

    private static async Task<TcpClient> ConnectAsync(Uri server)
    {
        var connection = new TcpClient();
        await connection.ConnectAsync(server.Host, server.Port, TestContext.Current.CancellationToken);
        return connection;
    }

    /// <summary>Sends this and reads until the server closes.</summary>
    private static async Task<string> SayAsync(Uri server, string request)
    {
        using var connection = await ConnectAsync(server);
        await connection.GetStream().WriteAsync(Encoding.ASCII.GetBytes(request), TestContext.Current.CancellationToken);
        using var reader = new StreamReader(connection.GetStream(), Encoding.UTF8);
        return await reader.ReadToEndAsync(TestContext.Current.CancellationToken);
    }
}
