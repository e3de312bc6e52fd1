using System.ComponentModel.DataAnnotations;
using System.Globalization;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents;
using Portfolio.Server.Documents.Parts;
using Portfolio.Server.Http;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class ProjectEndpoints
{
    public static void MapProjects(this IEndpointRouteBuilder portfolio)
    {
        portfolio.MapGet("/projects", List).WithName("listProjects").WithTags("Parts").NeedsAny(Right.Read, Right.Submit)
            .Produces<PageJson<ProjectEntryJson>>().ReadsConditionally().Refuses(422);
        var project = portfolio.MapGroup("/projects/{project}").WithTags("Parts");
        project.MapGet("", Get).WithName("getProject").NeedsAny(Right.Read, Right.Submit)
            .Produces<ProjectJson>().ReadsConditionally().Refuses(422);
        project.MapPut("", Put).WithName("putProject").Needs(Right.Submit)
            .Accepts<ProjectJson>("application/json")
            .Produces<WrittenJson>().Produces<WrittenJson>(StatusCodes.Status201Created)
            .ChangesConditionally().Refuses(409, 412, 413, 415, 422);
        project.MapPatch("", Patch).WithName("patchProject").Needs(Right.Submit)
            .AcceptsPatch().Produces<WrittenJson>().ChangesConditionally().Refuses(409, 412, 413, 415, 422);
        project.MapDelete("", Delete).WithName("deleteProject").Needs(Right.Manage)
            .Produces<WrittenJson>().RemovesConditionally().Refuses(409, 412, 422, 428);
    }

    /// <summary>The projects in document order, as far as the key may read or submit to them.</summary>
    /// <param name="cursor">Where the page before ended.</param>
    /// <param name="limit">Items in a page.</param>
    internal static async Task<IResult> List(
        [AsParameters] PartRead read, ProjectList projects, string? cursor = null, [Range(1, Paging.Most)] int limit = Paging.Usual)
    {
        var (after, more) = (Paging.Number(cursor) ?? 0, Paging.WithOneMore(limit));
        var found = await projects.ReadAsync(read.Caller, read.Portfolio, await read.NumberAsync(), after, more, read.Cancellation);
        if (found is null)
            return Problem.NotFound();
        var tag = EntityTags.OfDocument(found.Select(project => new PartHead(project.Entry.Id, project.Entry.Etag)));
        if (new Preconditions(read.Http.Request).HasAlready(tag))
            return Read.NotModified(read.Http, tag);
        read.Http.Response.GetTypedHeaders().ETag = tag;
        return TypedResults.Ok(Paging.Page(
            read.Http.Response, found, limit, project => project.Entry, project => project.Position.ToString(CultureInfo.InvariantCulture)));
    }

    /// <summary>A project as it was sent, defaults not filled in.</summary>
    internal static async Task<IResult> Get(string project, [AsParameters] PartRead read)
    {
        var part = await read.FindAsync(project);
        return Read.Part(read.Http, part.Hash, part.Bytes);
    }

    /// <summary>Creates the project as the last one, or replaces it at its place.</summary>
    /// <remarks>With the right to submit only the status date and what overhead has cost so far may differ from what is there.</remarks>
    internal static Task<IResult> Put(string project, [AsParameters] PartWrite write) => Change(project, write, "project.put");

    /// <summary>Changes members of the project. Activities and events are changed at their own addresses, by updates, or whole.</summary>
    /// <remarks>With the right to submit only the status date and what overhead has cost so far may be changed.</remarks>
    internal static Task<IResult> Patch(string project, [AsParameters] PartWrite write) => Change(project, write, "project.patch");

    /// <summary>Takes the project out of the document; refused while others are linked to it.</summary>
    internal static Task<IResult> Delete(string project, [AsParameters] PartWrite write) =>
        write.ToAsync(project, "project.delete", Right.Manage, new ProjectRemoval(project, write.Conditions).DrawAsync);

    private static async Task<IResult> Change(string project, PartWrite write, string action)
    {
        using var body = await write.BodyAsync();
        var edit = new ProjectEdit(project, write.Project(body, project), write.Conditions, write.Manages(project));
        return await write.ToAsync(project, action, write.Used(project), edit.DrawAsync);
    }
}
