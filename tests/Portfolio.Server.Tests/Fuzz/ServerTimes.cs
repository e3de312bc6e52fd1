using System.Collections.Concurrent;
using System.Diagnostics;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>How long requests take inside the server, by the number that they carry.</summary>
/// <param name="longest">Those that take longer are kept.</param>
internal sealed class ServerTimes(TimeSpan longest) : IStartupFilter
{
    public const string Header = "X-Fuzz";

    private long most;

    public ConcurrentDictionary<int, TimeSpan> Slow { get; } = [];

    public TimeSpan Most => new(Interlocked.Read(ref most));

    public Action<IApplicationBuilder> Configure(Action<IApplicationBuilder> next) => app =>
    {
        app.Use(async (context, rest) =>
        {
            var began = Stopwatch.GetTimestamp();
            await rest(context);
            if (int.TryParse(context.Request.Headers[Header], out var number))
                Keep(number, Stopwatch.GetElapsedTime(began));
        });
        next(app);
    };

    private void Keep(int number, TimeSpan taken)
    {
        if (taken > longest)
            Slow[number] = taken;
        for (var seen = Interlocked.Read(ref most); taken.Ticks > seen; seen = Interlocked.Read(ref most))
            Interlocked.CompareExchange(ref most, taken.Ticks, seen);
    }
}
