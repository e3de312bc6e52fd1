using System.ComponentModel.DataAnnotations;
using Portfolio.Model.Rules;

namespace Portfolio.Server.Hosting;

/// <summary>The largest sizes that are accepted (<c>Limits</c>). Defaults are those of the API's description.</summary>
public sealed class LimitOptions
{
    public const string Section = "Limits";

    private const int MiB = 1024 * 1024;

    /// <summary>More than any setting allows.</summary>
    public const int LargestBody = 1024 * MiB;

    /// <summary>Bytes of a whole document.</summary>
    [Range(1024, LargestBody)]
    public int DocumentBody { get; set; } = 64 * MiB;

    /// <summary>Bytes of any other body.</summary>
    [Range(1024, LargestBody)]
    public int Body { get; set; } = 8 * MiB;

    [Range(13, 64)]
    public int JsonDepth { get; set; } = 16;

    [Range(1, 100_000)]
    public int Projects { get; set; } = 500;

    /// <summary>Activities in one project.</summary>
    [Range(1, 100_000)]
    public int Activities { get; set; } = 5_000;

    /// <summary>Different nodes named by the pairs of the dependence.</summary>
    [Range(2, 2_000)]
    public int PairedNodes { get; set; } = 500;

    /// <summary>Points or outcomes of one distribution.</summary>
    [Range(2, 100_000)]
    public int Points { get; set; } = 1_000;

    /// <summary>Stated dates of one calendar.</summary>
    [Range(1, 100_000)]
    public int CalendarDates { get; set; } = 5_000;

    /// <summary>Changes of one pool's capacity.</summary>
    [Range(1, 100_000)]
    public int CapacityChanges { get; set; } = 1_000;

    [Range(10, 10_000_000)]
    public int Iterations { get; set; } = 1_000_000;

    /// <summary>Confidence levels in one request.</summary>
    [Range(1, 1_000)]
    public int Levels { get; set; } = 99;

    /// <summary>Bins of a histogram.</summary>
    [Range(1, 100_000)]
    public int Bins { get; set; } = 1_000;

    /// <summary>Requests a second of one key.</summary>
    [Range(1, 1_000_000)]
    public int RequestsPerSecond { get; set; } = 2_000;

    /// <summary>Runs of one portfolio that may wait.</summary>
    [Range(1, 100_000)]
    public int QueuedRuns { get; set; } = 100;

    /// <summary>Connections open at once; more are closed at once.</summary>
    [Range(1, 1_000_000)]
    public int Connections { get; set; } = 10_000;

    /// <summary>How long a request may take; streams of progress have no end of their own.</summary>
    [Range(typeof(TimeSpan), "00:00:00.100", "01:00:00")]
    public TimeSpan RequestTime { get; set; } = TimeSpan.FromSeconds(30);

    /// <summary>How long sending and checking a whole document may take.</summary>
    [Range(typeof(TimeSpan), "00:00:00.100", "01:00:00")]
    public TimeSpan DocumentTime { get; set; } = TimeSpan.FromMinutes(5);

    /// <summary>How long the headers of a request may take to come.</summary>
    [Range(typeof(TimeSpan), "00:00:01", "00:10:00")]
    public TimeSpan HeaderTime { get; set; } = TimeSpan.FromSeconds(15);

    /// <summary>Bytes a second that a body must bring, after its first five seconds.</summary>
    [Range(1, 1_000_000)]
    public int BodyBytesPerSecond { get; set; } = 240;

    /// <summary>Those that the model's rules hold a document to.</summary>
    public ModelLimits OfModel() => new()
    {
        Projects = Projects,
        Activities = Activities,
        PairedNodes = PairedNodes,
        Points = Points,
        CalendarDates = CalendarDates,
        CapacityChanges = CapacityChanges,
        MaxIterations = Iterations,
        Levels = Levels,
    };
}
