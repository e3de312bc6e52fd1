using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.Extensions.Options;
using Portfolio.Server.Hosting;
using Portfolio.Server.Jobs;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Demo.Start;

/// <summary>The demo takes part only when the program is started with <c>--demo</c>.</summary>
internal static class DemoSetup
{
    public const string Argument = "--demo";

    public static void AddDemo(this IServiceCollection services, string[] arguments)
    {
        if (!arguments.Contains(Argument, StringComparer.Ordinal))
            return;
        // The table is for whoever sits at the console; logs stay out of it unless they are asked for (Logging:LogLevel).
        services.Configure<LoggerFilterOptions>(filter => filter.MinLevel = LogLevel.Warning);
        services.AddSingleton<DemoPosting>();
        services.AddHostedService(provider => new DemoStart(
            provider.GetRequiredService<DemoPosting>(),
            provider.GetRequiredService<RunStore>(),
            provider.GetRequiredService<ResultStore>(),
            provider.GetRequiredService<TimeProvider>(),
            Console.Out,
            provider.GetRequiredService<RunSignal>().Give,
            () => Addresses(provider),
            provider.GetRequiredService<IHostApplicationLifetime>()));
    }

    private static DemoAddresses Addresses(IServiceProvider provider)
    {
        // Known once the server listens; a test server has none.
        var listening = provider.GetRequiredService<IServer>().Features.Get<IServerAddressesFeature>()?.Addresses.FirstOrDefault();
        var keyFile = provider.GetRequiredService<IOptions<StorageOptions>>().Value.FirstKeyFile;
        return new DemoAddresses(listening ?? "http://localhost", File.Exists(keyFile) ? keyFile : null);
    }
}
