using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;

namespace Portfolio.Server.Results;

/// <summary>The cautions of a run: of every result, its plan, its inputs' age, its figures; each with the scopes it concerns.</summary>
public static class RunWarnings
{
    /// <summary>A month and some days of grace: progress is commonly reported monthly.</summary>
    public const int StaleAfterDays = 35;

    /// <param name="found">Cautions about the model and about single iterations.</param>
    /// <param name="contingencies">At the configured levels.</param>
    internal static IReadOnlyList<WarningJson> Of(
        PortfolioDocument document, DateOnly asOf, IEnumerable<Warning> found, IEnumerable<Contingency> contingencies)
    {
        var projects = document.Projects.ToDictionary(project => project.Id, StringComparer.Ordinal);
        return
        [
            .. Cautions.Always.Concat(found).Concat(Stale(document, asOf)).Select(warning => Scoped(warning, projects)),
            .. contingencies.SelectMany(Cautions.Of).Except(Cautions.Always)
                .Select(warning => new WarningJson(warning.Code, warning.Message, null, [Scope.Portfolio.ToString()])),
        ];
    }

    private static IEnumerable<Warning> Stale(PortfolioDocument document, DateOnly asOf)
    {
        var limit = asOf.AddDays(-StaleAfterDays);
        var open = document.Projects.Where(project => project.Activities.Any(activity => !activity.Finished));
        if (open.Where(project => project.StatusDate < limit).Select(project => project.Id).ToArray() is { Length: > 0 } stale)
        {
            yield return new(
                CautionCodes.StaleStatus,
                $"The progress of these projects is reported up to a date more than {StaleAfterDays} days before {asOf:yyyy-MM-dd}; " +
                "what happened since is not in the figures.",
                stale);
        }
    }

    private static WarningJson Scoped(Warning warning, Dictionary<string, Project> projects)
    {
        var named = warning.Subjects.Select(subject => Names(subject, projects.ContainsKey)).OfType<string>()
            .Distinct(StringComparer.Ordinal).ToArray();
        var programmes = named.Select(id => projects[id].Programme).OfType<string>().Distinct(StringComparer.Ordinal);
        IEnumerable<Scope> scopes = [Scope.Portfolio, .. programmes.Select(Scope.OfProgramme), .. named.Select(Scope.OfProject)];
        return new(
            warning.Code, warning.Message,
            warning.Subjects.Count > 0 ? warning.Subjects : null,
            named.Length > 0 ? [.. scopes.Select(scope => scope.ToString())] : null);
    }

    /// <summary>
    /// The project that a subject names; null when it names none that is known. Written <c>weir-lock</c>, <c>weir-lock/A10</c> or
    /// <c>project/weir-lock</c>.
    /// </summary>
    internal static string? Names(string subject, Func<string, bool> known) => subject.Split('/') switch
    {
        ["project", var id] when known(id) => id,
        ["driver" or "programme" or "pool" or "calendar" or "event", _] => null,
        [var id, ..] when known(id) => id,
        _ => null,
    };
}
