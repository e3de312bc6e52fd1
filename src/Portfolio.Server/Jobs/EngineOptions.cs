using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Jobs;

/// <summary>How runs are worked (<c>Engine</c>). Nothing here changes a figure.</summary>
public sealed class EngineOptions
{
    public const string Section = "Engine";

    /// <summary>Threads of one run; 0: as many as there are processors.</summary>
    [Range(0, 1024)]
    public int Threads { get; set; }

    /// <summary>Runs that this process works at the same time.</summary>
    [Range(1, 64)]
    public int Runs { get; set; } = 1;

    /// <summary>Seconds after which a worker that gave no sign counts as gone. It gives one every third of them.</summary>
    [Range(3, 3600)]
    public int LeaseSeconds { get; set; } = 30;

    /// <summary>How often a run may be begun without any progress before it is given up.</summary>
    [Range(1, 100)]
    public int Attempts { get; set; } = 3;

    public int ThreadsOrAll => Threads == 0 ? Environment.ProcessorCount : Threads;

    public TimeSpan Lease => TimeSpan.FromSeconds(LeaseSeconds);
}
