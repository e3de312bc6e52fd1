using Microsoft.Extensions.Options;
using Portfolio.Store;

namespace Portfolio.Server.Hosting;

/// <summary>Runs the server until it is told to stop; why it cannot start is said in one line, not as a crash.</summary>
internal static class Starting
{
    /// <summary>The exit code.</summary>
    public const int CannotStart = 1;

    /// <summary>Null when a setting that the web server is made with cannot be read.</summary>
    public static WebApplication? BuildOrSayWhyNot(this WebApplicationBuilder builder)
    {
        try
        {
            return builder.Build();
        }
        catch (Exception refused) when (Why(refused) is { } line)
        {
            Console.Error.WriteLine(line);
            return null;
        }
    }

    public static async Task<int> RunToEndAsync(this WebApplication app)
    {
        try
        {
            Prepare(app.Services);
            await app.RunAsync();
            return 0;
        }
        catch (Exception refused) when (Why(refused) is { } line)
        {
            await Console.Error.WriteLineAsync(line);
            return CannotStart;
        }
    }

    /// <summary>
    /// Checks the settings and makes the services that start with the process, which opens the storage: what fails here the host would
    /// log as a crash.
    /// </summary>
    private static void Prepare(IServiceProvider services)
    {
        services.GetService<IStartupValidator>()?.Validate();
        _ = services.GetServices<IHostedService>();
    }

    private static string? Why(Exception refused) => refused switch
    {
        OptionsValidationException settings => string.Join(' ', settings.Failures.Select(Sentence)),
        // A value that is no number, say; the binder wraps what the converter threw.
        InvalidOperationException { InnerException: FormatException or ArgumentException } => refused.Message,
        // A folder that cannot be used, an address that is taken.
        StoreSchemaException or IOException or UnauthorizedAccessException => refused.Message,
        _ => null,
    };

    // The framework wraps a sentence in words about the class that holds the setting.
    private static string Sentence(string failure)
    {
        const string before = "with the error: '";
        var at = failure.IndexOf(before, StringComparison.Ordinal);
        return at < 0 || !failure.EndsWith("'.", StringComparison.Ordinal) ? failure : failure[(at + before.Length)..^2];
    }
}
