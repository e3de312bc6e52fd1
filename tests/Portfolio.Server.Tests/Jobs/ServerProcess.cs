using System.Collections.Concurrent;
using System.Diagnostics;
using System.Net;
using System.Net.Http.Headers;
using System.Net.Sockets;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Jobs;

/// <summary>The server as a process of its own, with the system's clock, that can be killed.</summary>
internal sealed class ServerProcess : IDisposable
{
    // Far more than a start takes on a busy machine.
    private static readonly TimeSpan LongestStart = TimeSpan.FromMinutes(2);

    private readonly Process process;

    private ServerProcess(Process process, HttpClient client) => (this.process, Client) = (process, client);

    public HttpClient Client { get; }

    public int Id => process.Id;

    /// <summary>What it has written so far, its log above all.</summary>
    public ConcurrentQueue<string> Said { get; } = [];

    /// <summary>Bytes of memory in use.</summary>
    public long Resident
    {
        get
        {
            process.Refresh();
            return process.WorkingSet64;
        }
    }

    /// <summary>Starts the server on a folder and waits until it is ready.</summary>
    /// <param name="settings">Environment variables beside the folder and the key.</param>
    public static async Task<ServerProcess> StartAsync(string directory, params (string Key, string Value)[] settings)
    {
        var address = $"http://127.0.0.1:{FreePort()}";
        // A write beyond a limit on the size of files shall be an error, as on a full disk, and no signal.
        var start = new ProcessStartInfo("sh", ["-c", $"trap '' XFSZ; exec dotnet '{Path.Combine(AppContext.BaseDirectory, "Portfolio.Server.dll")}'"])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            Environment =
            {
                ["ASPNETCORE_URLS"] = address,
                ["Storage__Directory"] = directory,
                ["Security__BootstrapKey"] = PortfolioServer.AdminKey,
                // However many processors there are: blocks come one after the other.
                ["Engine__Threads"] = "1",
            },
        };
        foreach (var (key, value) in settings)
            start.Environment[key] = value;
        var client = new HttpClient(new ContractCheck { InnerHandler = new SocketsHttpHandler() }) { BaseAddress = new Uri(address) };
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", PortfolioServer.AdminKey);
        var server = new ServerProcess(Process.Start(start)!, client);
        // What is not read would fill the pipe and stop the server.
        server.process.OutputDataReceived += (_, line) => server.Said.Enqueue(line.Data ?? "");
        server.process.ErrorDataReceived += (_, line) => server.Said.Enqueue(line.Data ?? "");
        server.process.BeginOutputReadLine();
        server.process.BeginErrorReadLine();
        await server.BeReadyAsync();
        return server;
    }

    private async Task BeReadyAsync()
    {
        var waited = Stopwatch.StartNew();
        while (!await IsReadyAsync(Client))
        {
            Assert.False(process.HasExited, $"The server ended: {string.Join(Environment.NewLine, Said)}");
            Assert.True(waited.Elapsed < LongestStart, $"The server is not ready: {string.Join(Environment.NewLine, Said)}");
            await Task.Delay(50, TestContext.Current.CancellationToken);
        }
    }

    private static async Task<bool> IsReadyAsync(HttpClient client)
    {
        try
        {
            return (await client.ReadAsync("/health/ready")).StatusCode == HttpStatusCode.OK;
        }
        catch (HttpRequestException)
        {
            return false;
        }
    }

    /// <summary>As <c>kill -9</c>: nothing of the process runs any more.</summary>
    public async Task KillAsync()
    {
        process.Kill();
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
    }

    /// <summary>As a service manager does it, and Ctrl-C; returns the exit code.</summary>
    public async Task<int> StopAsync()
    {
        using var kill = Process.Start("kill", ["-TERM", $"{process.Id}"]);
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        return process.ExitCode;
    }

    private static int FreePort()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        return ((IPEndPoint)listener.LocalEndpoint).Port;
    }

    public void Dispose()
    {
        if (!process.HasExited)
            process.Kill();
        process.Dispose();
        Client.Dispose();
    }
}
