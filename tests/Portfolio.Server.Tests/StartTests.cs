using System.Net;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests;

public sealed class StartTests
{
    [Fact]
    public async Task TheFirstKeyIsLeftInAFileThatOnlyItsOwnerReads()
    {
        var directory = Directory.CreateTempSubdirectory("portfolio-");
        try
        {
            string key;
            await using (var server = new PortfolioServer(directory.FullName, ("Security:BootstrapKey", null)))
            {
                Assert.Equal(HttpStatusCode.Unauthorized, (await server.Client(key: null).ReadAsync("/v1/portfolios")).StatusCode);
                var file = Path.Combine(directory.FullName, "first-key.txt");
                if (!OperatingSystem.IsWindows())
                    Assert.Equal(UnixFileMode.UserRead | UnixFileMode.UserWrite, File.GetUnixFileMode(file));
                key = (await File.ReadAllTextAsync(file, TestContext.Current.CancellationToken)).Trim();
                Assert.Equal(HttpStatusCode.OK, (await server.Client(key).ReadAsync("/v1/portfolios")).StatusCode);
            }
            await using var again = new PortfolioServer(directory.FullName, ("Security:BootstrapKey", null));
            Assert.Equal(HttpStatusCode.OK, (await again.Client(key).ReadAsync("/v1/portfolios")).StatusCode);
        }
        finally
        {
            directory.Delete(recursive: true);
        }
    }

    [Theory]
    [InlineData("/health/live", "all", """{"status":"ok","checks":{  }}""")]
    [InlineData("/health/ready", "all", """{"status":"ok","checks":{ "storage":"ok","jobs":"ok" }}""")]
    [InlineData("/health/ready", "api", """{"status":"ok","checks":{ "storage":"ok" }}""")]
    public async Task HealthNeedsNoKey(string address, string roles, string answer)
    {
        await using var server = new PortfolioServer(null, ("Roles", roles));
        var client = server.Client(key: null);
        // What works on runs starts beside the server and is ready a moment later.
        while ((await client.ReadAsync(address)).StatusCode == HttpStatusCode.ServiceUnavailable)
            await Task.Delay(20, TestContext.Current.CancellationToken);
        Assert.Equal(answer, await (await client.ReadAsync(address)).TextAsync());
    }
}
