using Portfolio.Engine.Results;
using Portfolio.Model.Documents;

namespace Portfolio.Server.Results;

/// <summary>The confidence levels of a run.</summary>
internal static class RunLevels
{
    /// <summary>Those that results report, in the order of the settings.</summary>
    public static IReadOnlyList<Level> Configured(Settings settings) => [.. settings.Confidence.Select(Level.Of).Distinct()];

    /// <summary>Those that are kept for ever, rising.</summary>
    public static IReadOnlyList<Level> Kept(Settings settings) => Level.KeptAnd(Configured(settings));
}

/// <summary>The words for what is measured, as stored and as asked for.</summary>
internal static class Metrics
{
    public const string Finish = "finish";
    public const string Cost = "cost";

    /// <summary>Only of series: cost at the level less base, of a part its allocated share.</summary>
    public const string Contingency = "contingency";

    public static readonly IReadOnlyList<string> All = [Finish, Cost, Contingency];
}
