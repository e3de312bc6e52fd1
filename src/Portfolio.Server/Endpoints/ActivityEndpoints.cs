using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents.Parts;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class ActivityEndpoints
{
    public static void MapActivities(this IEndpointRouteBuilder portfolio)
    {
        var activity = portfolio.MapGroup("/projects/{project}/activities/{activity}").WithTags("Parts");
        activity.MapGet("", Get).WithName("getActivity").NeedsAny(Right.Read, Right.Submit)
            .Produces<ActivityJson>().ReadsConditionally().Refuses(422);
        activity.MapPut("", Put).WithName("putActivity").Needs(Right.Submit)
            .Accepts<ActivityJson>("application/json")
            .Produces<WrittenJson>().Produces<WrittenJson>(StatusCodes.Status201Created)
            .ChangesConditionally().Refuses(409, 412, 413, 415, 422);
        activity.MapPatch("", Patch).WithName("patchActivity").Needs(Right.Submit)
            .AcceptsPatch().Produces<WrittenJson>().ChangesConditionally().Refuses(409, 412, 413, 415, 422);
        activity.MapDelete("", Delete).WithName("deleteActivity").Needs(Right.Manage)
            .Produces<WrittenJson>().RemovesConditionally().Refuses(409, 412, 422, 428);
    }

    /// <summary>An activity as it was sent, defaults not filled in.</summary>
    internal static async Task<IResult> Get(string project, string activity, [AsParameters] PartRead read)
    {
        var (all, index) = ActivityList.Of(DocumentReader.OfStored.ReadProject((await read.FindAsync(project)).Bytes), activity);
        if (index == all.Count)
            return Problem.NotFound("There is no such activity.");
        var bytes = DocumentReader.Bytes(all[index]);
        return Read.Part(read.Http, ContentHash.Of(bytes), bytes);
    }

    /// <summary>Creates the activity as the last of its project, or replaces it at its place.</summary>
    /// <remarks>With the right to submit demands and drivers must stay as they are.</remarks>
    internal static Task<IResult> Put(string project, string activity, [AsParameters] PartWrite write) =>
        Change(project, activity, write, "activity.put");

    /// <summary>Changes members of the activity. A distribution is sent with all its members.</summary>
    /// <remarks>With the right to submit demands and drivers must stay as they are.</remarks>
    internal static Task<IResult> Patch(string project, string activity, [AsParameters] PartWrite write) =>
        Change(project, activity, write, "activity.patch");

    /// <summary>Takes the activity out of its project; refused while others are linked to it.</summary>
    internal static Task<IResult> Delete(string project, string activity, [AsParameters] PartWrite write) =>
        write.ToAsync(project, "activity.delete", Right.Manage, new ActivityRemoval(project, activity, write.Conditions).DrawAsync);

    private static async Task<IResult> Change(string project, string activity, PartWrite write, string action)
    {
        using var body = await write.BodyAsync();
        var edit = new ActivityEdit(
            project, activity, write.Activity(body, project, activity), write.Conditions, write.Manages(project));
        return await write.ToAsync(project, action, write.Used(project), edit.DrawAsync);
    }
}
