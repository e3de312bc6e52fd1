using System.Text.Json;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>The cautions kept with a run, as far as a caller may see them: a key limited to projects is told of these alone.</summary>
internal sealed class KeptWarnings
{
    private KeptWarnings(IReadOnlyList<WarningJson> all) => All = all;

    public IReadOnlyList<WarningJson> All { get; }

    public static KeptWarnings Read(StoredRun run, Caller caller)
    {
        var kept = run.Warnings is null ? [] : JsonSerializer.Deserialize(run.Warnings, ResultsContext.Plain.IReadOnlyListWarningJson)!;
        return new(caller.Holds(Right.Read, run.Portfolio) ? kept : [.. kept.Select(warning => Seen(warning, run.Portfolio, caller)).OfType<WarningJson>()]);
    }

    /// <summary>Those that concern a scope.</summary>
    public IReadOnlyList<WarningJson> Of(Scope scope)
    {
        var written = (scope.Kind == ScopeKind.Milestone ? Scope.OfProject(scope.Project!) : scope).ToString();
        return [.. All.Where(warning => warning.Scopes is null || warning.Scopes.Contains(written, StringComparer.Ordinal))];
    }

    private static WarningJson? Seen(WarningJson warning, string portfolio, Caller caller)
    {
        if (warning.Scopes is not { } scopes) return warning;
        var own = scopes.Where(scope => Scope.Parse(scope) is { Project: { } project } && caller.Holds(Right.Read, portfolio, project)).ToArray();
        if (own.Length == 0) return null;
        var ids = own.Select(scope => Scope.Parse(scope)!.Project!).ToHashSet(StringComparer.Ordinal);
        return warning with { Scopes = own, Subjects = warning.Subjects is { } subjects ? [.. subjects.Where(subject => RunWarnings.Names(subject, ids.Contains) is not null)] : null };
    }
}
