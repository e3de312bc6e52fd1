using Microsoft.AspNetCore.Server.Kestrel.Core;
using Microsoft.Extensions.Options;

namespace Portfolio.Server.Hosting;

/// <summary>Where the server listens and what it accepts before any handler sees it; and how it logs.</summary>
internal static class WebServerSetup
{
    // Before a slow body is given up.
    private static readonly TimeSpan FirstBytes = TimeSpan.FromSeconds(5);

    private const string DefaultUrl = "http://127.0.0.1:5080";

    public static void AddWebServer(this WebApplicationBuilder builder)
    {
        var configuration = builder.Configuration;
        if (configuration["urls"] is null && configuration["http_ports"] is null && configuration["https_ports"] is null)
            builder.WebHost.UseUrls(DefaultUrl);
        builder.Services.AddOptions<KestrelServerOptions>().Configure<IOptions<LimitOptions>>(
            (kestrel, limits) => Configure(kestrel, limits.Value));
    }

    private static void Configure(KestrelServerOptions kestrel, LimitOptions limits)
    {
        kestrel.AddServerHeader = false;
        // Handlers hold bodies to their own, smaller limits; this one stops what no handler would take.
        kestrel.Limits.MaxRequestBodySize = LimitOptions.LargestBody;
        kestrel.Limits.MaxConcurrentConnections = limits.Connections;
        kestrel.Limits.MaxRequestHeadersTotalSize = 16 * 1024;
        kestrel.Limits.RequestHeadersTimeout = limits.HeaderTime;
        kestrel.Limits.MinRequestBodyDataRate = new MinDataRate(limits.BodyBytesPerSecond, FirstBytes);
    }

    public static void AddJsonLogs(this ILoggingBuilder logging)
    {
        logging.ClearProviders();
        logging.AddJsonConsole(console =>
        {
            console.UseUtcTimestamp = true;
            console.TimestampFormat = "yyyy-MM-dd'T'HH:mm:ss.fff'Z'";
        });
        logging.AddFilter("Microsoft.AspNetCore", LogLevel.Warning);
        logging.AddFilter("Hangfire", LogLevel.Warning);
    }
}
