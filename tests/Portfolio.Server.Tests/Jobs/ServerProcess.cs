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
    private readonly Process process;

    private ServerProcess(Process process, HttpClient client, ConcurrentQueue<string> said) =>
        (this.process, Client, Said) = (process, client, said);

    public HttpClient Client { get; }

    /// <summary>The lines of its log.</summary>
    public IReadOnlyCollection<string> Said { get; }

    /// <summary>Starts the server on a folder and waits until it is ready.</summary>
    public static async Task<ServerProcess> StartAsync(string directory, params (string Key, string Value)[] settings)
    {
        var address = $"http://127.0.0.1:{FreePort()}";
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "Portfolio.Server.dll")])
        {
            RedirectStandardOutput = true,
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
        var process = Process.Start(start)!;
        var said = new ConcurrentQueue<string>();
        // What is not read would fill the pipe and stop the server.
        process.OutputDataReceived += (_, line) => said.Enqueue(line.Data ?? "");
        process.BeginOutputReadLine();
        var client = new HttpClient(new ContractCheck { InnerHandler = new SocketsHttpHandler() }) { BaseAddress = new Uri(address) };
        client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", PortfolioServer.AdminKey);
        while (!await IsReadyAsync(client))
        {
            Assert.False(process.HasExited);
            await Task.Delay(100, TestContext.Current.CancellationToken);
        }
        return new ServerProcess(process, client, said);
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
