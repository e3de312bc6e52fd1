using System.Diagnostics;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Telemetry;

/// <summary>Spans of this assembly. Ids stand on spans and in logs, never on metrics, whose number of attributes must stay small.</summary>
internal static class ServerTelemetry
{
    /// <summary>Name of the source of spans and of the meter.</summary>
    public const string Name = "Portfolio.Server";

    public static readonly ActivitySource Spans = new(Name);

    /// <summary>W3C trace context of what is going on here, to be kept with what it asks for; null when nothing is traced.</summary>
    public static string? TraceParent => Activity.Current?.Id;

    /// <summary>
    /// The span of one attempt at a run: a trace of its own, linked to the request or the sweep that asked for it, which may be long over.
    /// </summary>
    public static Activity? RunSpan(StoredRun run)
    {
        var known = ActivityContext.TryParse(run.TraceParent, null, isRemote: true, out var asked);
        ActivityLink[] links = known ? [new ActivityLink(asked)] : [];
        // Whatever woke the worker is not what asked for the run.
        Activity.Current = null;
        return Spans.StartActivity(ActivityKind.Internal, name: "run", links: links)
            ?.SetTag("portfolio.run", run.Id).SetTag("portfolio.portfolio", run.Portfolio).SetTag("portfolio.revision", run.Revision)
            .SetTag("portfolio.iterations", run.Iterations).SetTag("portfolio.attempt", run.Attempt);
    }
}
