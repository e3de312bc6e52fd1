using System.Text.Json.Serialization;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Runs;

/// <summary>A run that is asked for. Everything may be left out.</summary>
public sealed record RunRequestJson
{
    /// <summary>Whole number 10…1,000,000. Left out: that of the settings.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Iterations { get; init; }

    /// <summary>Whole number 0…2⁵³−1. Left out: that of the settings.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Seed { get; init; }

    /// <summary>The revision to run. Left out: the newest.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Revision { get; init; }

    /// <summary>The local date for which the run stands, not in the future. Left out: today.</summary>
    public string? AsOf { get; init; }

    /// <summary>Whether it shall be a point of the series. Left out: true when seed and iterations are those of the settings.</summary>
    public bool? Recorded { get; init; }

    /// <summary>Id of the run that stands for the date and shall be replaced.</summary>
    public string? Replaces { get; init; }
}
