using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Documents.Parts;

/// <summary>Creates, replaces or patches one project.</summary>
/// <param name="manages">False for who may only submit.</param>
internal sealed class ProjectEdit(string project, PartBody<ProjectJson> body, Preconditions conditions, bool manages)
{
    public async Task<Draft> DrawAsync(DocumentState state)
    {
        var stored = await state.BytesAsync(project);
        if (stored is null && body.NeedsStored)
            return Problem.NotFound("There is no such project to patch.");
        if (conditions.OfChanging(state.Tag(project)) is { } refused)
            return refused;
        var after = body.Over(stored);
        if (!manages && SubmitLimits.OfProject(project, stored, after) is { } forbidden)
            return forbidden;
        return new Draft
        {
            Projects = [new(after.Content, after.Place)], Faults = after.Faults, Sent = body.Json, Creates = stored is null,
        };
    }
}

/// <summary>Takes one project out of the document.</summary>
internal sealed class ProjectRemoval(string project, Preconditions conditions)
{
    public Task<Draft> DrawAsync(DocumentState state) => Task.FromResult(Draw(state));

    private Draft Draw(DocumentState state)
    {
        if (state.Tag(project) is not { } tag)
            return Problem.NotFound("There is no such project.");
        if (conditions.OfReplacing(tag) is { } refused)
            return refused;
        return new Draft { Removed = [project], Removes = true };
    }
}
