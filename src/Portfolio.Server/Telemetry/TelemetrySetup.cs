using Npgsql;
using OpenTelemetry.Metrics;
using OpenTelemetry.Resources;
using OpenTelemetry.Trace;

namespace Portfolio.Server.Telemetry;

/// <summary>Spans and measures leave the process only when an OTLP endpoint is configured; otherwise nothing is collected.</summary>
internal static class TelemetrySetup
{
    // Name and meaning are those of the OpenTelemetry specification.
    private const string Endpoint = "OTEL_EXPORTER_OTLP_ENDPOINT";

    private const string PostgresMeter = "Npgsql";

    public static void AddTelemetry(this IServiceCollection services, IConfiguration configuration)
    {
        services.AddMetrics();
        services.AddSingleton<RunMeasures>();
        if (string.IsNullOrEmpty(configuration[Endpoint]))
            return;
        services.AddOpenTelemetry()
            .ConfigureResource(resource => resource.AddService("portfolio"))
            .WithTracing(tracing => tracing.AddSource(ServerTelemetry.Name).AddNpgsql().AddAspNetCoreInstrumentation().AddOtlpExporter())
            .WithMetrics(metrics => metrics
                .AddMeter(ServerTelemetry.Name, PostgresMeter).AddAspNetCoreInstrumentation().AddRuntimeInstrumentation().AddOtlpExporter());
    }
}
