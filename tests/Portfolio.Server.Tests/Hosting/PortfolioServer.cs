using System.Net.Http.Headers;
using Microsoft.AspNetCore.Hosting;
using Microsoft.AspNetCore.Mvc.Testing;
using Microsoft.AspNetCore.TestHost;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Time.Testing;
using Portfolio.Server.Tests.Contract;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Hosting;

/// <summary>
/// The real server on a folder of its own, reached through HTTP alone; only its clock is a fake, and stands until it is moved.
/// </summary>
public sealed class PortfolioServer : IAsyncDisposable
{
    public const string AdminKey = "the-administrator-key-of-the-tests-0123456789";

    private readonly WebApplicationFactory<Program> factory;

    /// <param name="directory">An existing folder to start on; null: a new one, removed at the end.</param>
    /// <param name="settings">Settings beside the folder and the key, such as <c>Limits:Body</c>; a null value takes one away.</param>
    public PortfolioServer(string? directory = null, params (string Key, string? Value)[] settings)
    {
        Directory = directory ?? System.IO.Directory.CreateTempSubdirectory("portfolio-").FullName;
        OwnsDirectory = directory is null;
        factory = new WebApplicationFactory<Program>().WithWebHostBuilder(host =>
        {
            host.UseSetting("Storage:Directory", Directory);
            host.UseSetting("Security:BootstrapKey", AdminKey);
            host.UseSetting("Logging:LogLevel:Default", "Warning");
            foreach (var (key, value) in settings)
                host.UseSetting(key, value);
            host.ConfigureTestServices(services =>
            {
                services.AddSingleton<TimeProvider>(Clock);
                Outside(services);
            });
        });
    }

    public string Directory { get; }

    /// <summary>2027-01-04T12:00Z, a Monday.</summary>
    public FakeTimeProvider Clock { get; } = new(new DateTimeOffset(2027, 1, 4, 12, 0, 0, TimeSpan.Zero));

    /// <summary>Puts something in the place of the network outside.</summary>
    public Action<IServiceCollection> Outside { get; init; } = _ => { };

    public IServiceProvider Services => factory.Services;

    private bool OwnsDirectory { get; }

    /// <summary>A client that presents a key; null: none. Every answer is held against the API's description.</summary>
    public HttpClient Client(string? key = AdminKey)
    {
        var client = factory.CreateDefaultClient(new ContractCheck());
        if (key is not null)
            client.DefaultRequestHeaders.Authorization = new AuthenticationHeaderValue("Bearer", key);
        return client;
    }

    /// <summary>A client with a new key that has these grants.</summary>
    public async Task<HttpClient> ClientAsync(params Grant[] grants)
    {
        var key = await Services.GetRequiredService<KeyStore>()
            .CreateAsync(Caller.System, "of a test", grants, expiresAt: null, TestContext.Current.CancellationToken);
        return Client(key!.Secret);
    }

    /// <summary>The API as this server describes it.</summary>
    internal async Task<DescribedApi> ApiAsync() => new(await (await Client(key: null).ReadAsync("/openapi.json")).TextAsync());

    public async ValueTask DisposeAsync()
    {
        await factory.DisposeAsync();
        await FolderIsFreeAsync();
        if (OwnsDirectory)
            System.IO.Directory.Delete(Directory, recursive: true);
    }

    /// <summary>The factory does not wait for the end of the program, which lets go of the folder last.</summary>
    private async Task FolderIsFreeAsync()
    {
        var hold = Path.Combine(Directory, "portfolio.lock");
        while (File.Exists(hold))
        {
            try
            {
                using var free = new FileStream(hold, FileMode.Open, FileAccess.ReadWrite, FileShare.None);
                return;
            }
            catch (IOException)
            {
                await Task.Delay(10, TestContext.Current.CancellationToken);
            }
        }
    }
}

/// <summary>One server for all tests of a class; each test works on portfolios of its own.</summary>
public sealed class ServerFixture : IAsyncDisposable
{
    public PortfolioServer Server { get; } = new();

    public ValueTask DisposeAsync() => Server.DisposeAsync();
}
