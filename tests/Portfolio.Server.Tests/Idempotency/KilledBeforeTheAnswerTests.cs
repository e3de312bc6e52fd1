using System.Net.Sockets;
using System.Text;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Jobs;

namespace Portfolio.Server.Tests.Idempotency;

/// <summary>A server killed after its write was kept, before anybody heard of it.</summary>
public sealed class KilledBeforeTheAnswerTests
{
    [Fact]
    public async Task TheNextServerGivesTheAnswerThatWasLost()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals of Unix are sent.");
        var directory = Directory.CreateTempSubdirectory("portfolio-");
        try
        {
            var write = new Write("putDocument", HttpMethod.Put, "document?note=lost", Samples.Document("Lost"));
            using (var first = await ServerProcess.StartAsync(directory.FullName))
            {
                using var socket = await SendUnheardAsync(first.Client.BaseAddress!, write, "lost");
                while (!(await first.Client.ReadAsync("/v1/portfolios/p/document")).IsSuccessStatusCode)
                    await Task.Delay(5, TestContext.Current.CancellationToken);
                await first.KillAsync();
            }
            using var second = await ServerProcess.StartAsync(directory.FullName);
            var answer = await write.SendAsync(second.Client, "p", "lost");
            Assert.True(answer.Again);
            Assert.Equal("""{"portfolio":"p","revision":1,"changed":true}""", answer.Body);
            Assert.Equal("/v1/portfolios/p/document", answer.Location);
            var read = await second.Client.ReadAsync("/v1/portfolios/p/document");
            Assert.Equal(read.Tag(), answer.Tag);
        }
        finally
        {
            directory.Delete(recursive: true);
        }
    }

    /// <summary>Sends the request and never reads what is said to it.</summary>
    private static async Task<TcpClient> SendUnheardAsync(Uri server, Write write, string key)
    {
        var socket = new TcpClient();
        await socket.ConnectAsync(server.Host, server.Port, TestContext.Current.CancellationToken);
        var request = $"""
            {write.Method} /v1/portfolios/p/{write.Address} HTTP/1.1
            Host: {server.Authority}
            Authorization: Bearer {PortfolioServer.AdminKey}
            Content-Type: application/json; charset=utf-8
            Content-Length: {Encoding.UTF8.GetByteCount(write.Body!)}
            Idempotency-Key: {key}


            """.ReplaceLineEndings("\r\n");
        await socket.GetStream().WriteAsync(Encoding.UTF8.GetBytes(request + write.Body), TestContext.Current.CancellationToken);
        return socket;
    }
}
