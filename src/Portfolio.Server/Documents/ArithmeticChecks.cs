using Portfolio.Engine.Dependence;
using Portfolio.Engine.Distributions;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Documents;

/// <summary>
/// The engine's pure checks over a whole document: whether correlations can exist together and stated percentiles have a distribution.
/// </summary>
internal static class ArithmeticChecks
{
    private const string Dependence = "/settings/dependence";

    /// <param name="known">Faults found so far: what is at fault already is not worked out.</param>
    public static IEnumerable<Fault> Of(PortfolioDocument document, IReadOnlyList<Fault> known)
    {
        var spoilt = Spoilt(known);
        var ofProjects = SideBySide.Each(document.Projects, (project, index) => OfProject(project, $"/projects/{index}", spoilt));
        return
        [
            .. OfSettings(document.Settings, spoilt),
            .. ofProjects.SelectMany(own => own),
            .. OfDependence(document.Settings, document.Projects, known),
        ];
    }

    /// <summary>Stated distributions of the settings.</summary>
    public static IReadOnlyList<Fault> OfSettings(Settings settings, IReadOnlySet<string> spoilt)
    {
        var faults = new List<Fault>();
        StatedDistributions.InSettings(settings, stated => Judge(stated, spoilt, faults));
        return faults;
    }

    /// <summary>Stated distributions of one project.</summary>
    public static IReadOnlyList<Fault> OfProject(Project project, string path, IReadOnlySet<string> spoilt)
    {
        var faults = new List<Fault>();
        StatedDistributions.InProject(project, path, stated => Judge(stated, spoilt, faults));
        return faults;
    }

    /// <param name="projects">Only ids and programmes are read.</param>
    public static IReadOnlyList<Fault> OfDependence(Settings settings, IReadOnlyList<Project> projects, IReadOnlyList<Fault> known) =>
        CanJudgeDependence(settings, projects, known) ? DependenceCheck.Check(settings, projects, Dependence) : [];

    /// <summary>Places at fault and their owners: a distribution is spoilt by a fault in one of its members.</summary>
    public static IReadOnlySet<string> Spoilt(IReadOnlyList<Fault> known)
    {
        var spoilt = new HashSet<string>(StringComparer.Ordinal);
        foreach (var fault in known)
        {
            spoilt.Add(fault.Path);
            if (fault.Path.LastIndexOf('/') is > 0 and var owner)
                spoilt.Add(fault.Path[..owner]);
        }
        return spoilt;
    }

    private static void Judge(StatedDistribution stated, IReadOnlySet<string> spoilt, List<Fault> faults)
    {
        if (NeedsArithmetic(stated.Distribution) && (spoilt.Count == 0 || !spoilt.Contains(stated.Path)) && Flaw(stated) is { } fault)
            faults.Add(fault);
    }

    private static bool NeedsArithmetic(Distribution stated) => stated switch
    {
        Triangular d => d.LowPercentile > 0 || d.HighPercentile < 100,
        Pert d => d.LowPercentile > 0 || d.HighPercentile < 100,
        Normal d => d.Min is not null || d.Max is not null,
        LognormalByMoments or LognormalByPercentiles => true,
        _ => false,
    };

    private static Fault? Flaw(StatedDistribution stated)
    {
        if (MarginalCheck.Fault(stated.Distribution, out var lowest) is { } sentence)
            return new Fault(stated.Path, stated.Place.Subject, FaultCodes.DistributionEnds, sentence);
        // Ends stated as percentiles reach further out than they say. A normal's draws below 0 count as 0.
        return stated is { MayBeNegative: false, Distribution: Triangular or Pert }
            && lowest < 0
            ? new Fault(stated.Path, stated.Place.Subject, RuleCodes.DistributionNegative, FormattableString.Invariant(
                $"With these percentiles the distribution reaches down to {lowest:0.###}; here it may not be negative."))
            : null;
    }

    /// <summary>Nodes must have names of their own, and what was stated about them must be in order.</summary>
    private static bool CanJudgeDependence(Settings settings, IReadOnlyList<Project> projects, IReadOnlyList<Fault> known) =>
        Distinct(settings.Drivers.Select(driver => driver.Id))
        && Distinct(projects.Select(project => project.Id))
        && !known.Any(fault => fault.Path.StartsWith(Dependence, StringComparison.Ordinal));

    private static bool Distinct(IEnumerable<string?> ids)
    {
        var seen = new HashSet<string>(StringComparer.Ordinal);
        return ids.All(id => id is not null && seen.Add(id));
    }
}
