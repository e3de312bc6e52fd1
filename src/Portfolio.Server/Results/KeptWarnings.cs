using System.Text.Json;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Results;

/// <summary>The cautions kept with a run, as far as a caller may see them: a key limited to projects is told of these alone.</summary>
internal sealed class KeptWarnings
{
    private KeptWarnings(IReadOnlyList<WarningJson> all) => All = all;

    public IReadOnlyList<WarningJson> All { get; }

    public static KeptWarnings Read(SeenRun run)
    {
        var kept = run.Run.Warnings is { } json ? JsonSerializer.Deserialize(json, ResultsContext.Plain.IReadOnlyListWarningJson)! : [];
        var seen = run.Caller.Holds(Right.Read, run.Portfolio) ? kept : kept.Select(warning => Seen(warning, run)).OfType<WarningJson>();
        return new([.. seen]);
    }

    /// <summary>Those that concern a scope.</summary>
    public IReadOnlyList<WarningJson> Of(Scope scope)
    {
        var written = (scope.Kind == ScopeKind.Milestone ? Scope.OfProject(scope.Project!) : scope).ToString();
        return [.. All.Where(warning => warning.Scopes is null || warning.Scopes.Contains(written, StringComparer.Ordinal))];
    }

    private static WarningJson? Seen(WarningJson warning, SeenRun run)
    {
        if (warning.Scopes is not { } scopes) return warning;
        var own = scopes.Select(Scope.Parse).Select(scope => scope?.Project).OfType<string>()
            .Where(project => run.Caller.Holds(Right.Read, run.Portfolio, project)).ToHashSet(StringComparer.Ordinal);
        return own.Count == 0 ? null : warning with
        {
            Scopes = [.. own.Select(project => Scope.OfProject(project).ToString())],
            Subjects = warning.Subjects?.Where(subject => RunWarnings.Names(subject, own.Contains) is not null).ToArray(),
        };
    }
}
