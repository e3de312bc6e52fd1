using System.Collections.Concurrent;
using System.Diagnostics;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>How long requests take inside the server, by the number that they carry.</summary>
internal sealed class ServerTimes : IStartupFilter
{
    public const string Header = "X-Fuzz";

    public ConcurrentDictionary<int, TimeSpan> Taken { get; } = [];

    public Action<IApplicationBuilder> Configure(Action<IApplicationBuilder> next) => app =>
    {
        app.Use(async (context, rest) =>
        {
            var began = Stopwatch.GetTimestamp();
            await rest(context);
            if (int.TryParse(context.Request.Headers[Header], out var number))
                Taken[number] = Stopwatch.GetElapsedTime(began);
        });
        next(app);
    };
}
