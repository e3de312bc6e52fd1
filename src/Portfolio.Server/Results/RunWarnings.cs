using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Results;

/// <summary>The cautions of a run: those of every result, of its plan, of its inputs' age and of its figures, each with the scopes that it concerns.</summary>
public static class RunWarnings
{
    public const string StaleStatus = "status.stale";
    public const string DatesClamped = "dates.clamped";

    /// <summary>A month and some days of grace: progress is commonly reported monthly.</summary>
    public const int StaleAfterDays = 35;

    /// <param name="plan">Cautions about the model.</param>
    /// <param name="clamped">Ids of projects with a finish beyond the last date there is.</param>
    /// <param name="contingencies">At the configured levels.</param>
    internal static IReadOnlyList<WarningJson> Of(
        PortfolioDocument document, DateOnly asOf, IEnumerable<Warning> plan, IReadOnlyList<string> clamped, IEnumerable<Contingency> contingencies)
    {
        var projects = document.Projects.ToDictionary(project => project.Id, StringComparer.Ordinal);
        return
        [
            .. Cautions.Always.Concat(plan).Concat(Stale(document, asOf)).Concat(Clamped(clamped)).Select(warning => Scoped(warning, projects)),
            .. contingencies.SelectMany(Cautions.Of).Except(Cautions.Always)
                .Select(warning => new WarningJson(warning.Code, warning.Message, null, [Scope.Portfolio.ToString()])),
        ];
    }

    private static IEnumerable<Warning> Stale(PortfolioDocument document, DateOnly asOf)
    {
        var limit = asOf.AddDays(-StaleAfterDays);
        var stale = document.Projects.Where(project => project.StatusDate < limit && project.Activities.Any(activity => !activity.Finished));
        if (stale.Select(project => project.Id).ToArray() is { Length: > 0 } ids)
            yield return new(StaleStatus, $"The progress of these projects is reported up to a date more than {StaleAfterDays} days before {asOf:yyyy-MM-dd}; what happened since is not in the figures.", ids);
    }

    private static IEnumerable<Warning> Clamped(IReadOnlyList<string> projects)
    {
        if (projects.Count > 0)
            yield return new(DatesClamped, $"In some iterations these projects finish after {Instants.ToDate(Instants.LastDay):yyyy-MM-dd}, the last date there is; such finishes are counted on that day.", projects);
    }

    private static WarningJson Scoped(Warning warning, Dictionary<string, Project> projects)
    {
        var named = warning.Subjects.Select(subject => Names(subject, projects.ContainsKey)).OfType<string>().Distinct(StringComparer.Ordinal).Select(id => projects[id]).ToArray();
        var programmes = named.Select(project => project.Programme).OfType<string>().Distinct(StringComparer.Ordinal).Select(id => Scope.OfProgramme(id).ToString());
        return new(
            warning.Code, warning.Message,
            warning.Subjects.Count > 0 ? warning.Subjects : null,
            named.Length > 0 ? [Scope.Portfolio.ToString(), .. programmes, .. named.Select(project => Scope.OfProject(project.Id).ToString())] : null);
    }

    /// <summary>The project that a subject names; null when it names none that is known. Written <c>weir-lock</c>, <c>weir-lock/A10</c> or <c>project/weir-lock</c>.</summary>
    internal static string? Names(string subject, Func<string, bool> known) => subject.Split('/') switch
    {
        ["project", var id] when known(id) => id,
        ["driver" or "programme" or "pool" or "calendar" or "event", _] => null,
        [var id, ..] when known(id) => id,
        _ => null,
    };
}
