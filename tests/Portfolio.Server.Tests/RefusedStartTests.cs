using System.Diagnostics;
using System.Net;
using System.Net.Sockets;

namespace Portfolio.Server.Tests;

/// <summary>A server that cannot start says why in one line and ends with 1.</summary>
public sealed class RefusedStartTests : IDisposable
{
    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("portfolio-");

    [Theory]
    [InlineData("Security__BootstrapKey", "too short", "at least 32 characters")]
    [InlineData("Roles", "everything", "Roles must be all, api or worker.")]
    [InlineData("Limits__JsonDepth", "5", "JsonDepth")]
    [InlineData("Limits__DocumentBody", "large", "Limits:DocumentBody")]
    [InlineData("Storage__Postgres", "the server in the cellar", "Storage:Postgres is no connection string")]
    [InlineData("Storage__Postgres", "Host=127.0.0.1;Port=1;Database=d", "The storage cannot be used: Failed to connect to 127.0.0.1:1")]
    [InlineData("Security__Oidc__Authority", "http://issuer.invalid", "must be an https address. Security:Oidc:Audience is missing")]
    public async Task AWrongSettingIsNamed(string key, string value, string said) =>
        Assert.Contains(said, await WhyAsync((key, value)), StringComparison.Ordinal);

    [Theory]
    [InlineData("none")]
    [InlineData("HS256,RS256")]
    public async Task OnlySignaturesOfTheIssuerAloneCanBeAllowed(string algorithms) =>
        Assert.StartsWith("Security:Oidc:Algorithms may name RS256", await WhyAsync(
            ("Security__Oidc__Authority", "https://issuer.invalid"), ("Security__Oidc__Audience", "portfolio"),
            ("Security__Oidc__Algorithms", algorithms)));

    [Fact]
    public async Task AFolderThatAnotherProcessHasIsNamed()
    {
        using var other = new FileStream(
            Path.Combine(folder.FullName, "portfolio.lock"), FileMode.Create, FileAccess.ReadWrite, FileShare.None);
        Assert.Equal(
            $"The storage folder '{folder.FullName}' is in use by another process. One process at a time may open it.", await WhyAsync());
    }

    [Fact]
    public async Task AFolderThatCannotBeMadeIsNamed()
    {
        var file = Path.Combine(folder.FullName, "a-file");
        await File.WriteAllTextAsync(file, "", TestContext.Current.CancellationToken);
        Assert.Contains(file, await WhyAsync(("Storage__Directory", Path.Combine(file, "data"))), StringComparison.Ordinal);
    }

    [Fact]
    public async Task AFileThatIsNoDatabaseIsNamed()
    {
        var file = Path.Combine(folder.FullName, "portfolio.db");
        await File.WriteAllTextAsync(file, new string('x', 5000), TestContext.Current.CancellationToken);
        Assert.Contains(file, await WhyAsync(), StringComparison.Ordinal);
        Assert.Equal(5000, new FileInfo(file).Length);
    }

    [Fact]
    public async Task AnAddressThatIsTakenIsNamed()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        var address = $"http://{listener.LocalEndpoint}";
        Assert.Contains(address, await WhyAsync(("ASPNETCORE_URLS", address)), StringComparison.Ordinal);
    }

    /// <summary>What the server says to the error output.</summary>
    private async Task<string> WhyAsync(params (string Key, string Value)[] settings)
    {
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "Portfolio.Server.dll")])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            Environment = { ["ASPNETCORE_URLS"] = "http://127.0.0.1:0", ["Storage__Directory"] = folder.FullName },
        };
        foreach (var (key, value) in settings)
            start.Environment[key] = value;
        using var process = Process.Start(start)!;
        process.OutputDataReceived += (_, _) => { };
        process.BeginOutputReadLine();
        var said = await process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        Assert.Equal(1, process.ExitCode);
        return Assert.Single(said.Split('\n', StringSplitOptions.RemoveEmptyEntries)).TrimEnd();
    }

    public void Dispose() => folder.Delete(recursive: true);
}
