using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents.Parts;

/// <summary>Creates, replaces or patches one activity of a project; a new one goes last.</summary>
/// <param name="manages">False for who may only submit.</param>
internal sealed class ActivityEdit(string project, string activity, PartBody<ActivityJson> body, Preconditions conditions, bool manages)
{
    public async Task<Draft> DrawAsync(DocumentState state)
    {
        if (await state.ProjectAsync(project) is not { } owner)
            return Problem.NotFound("There is no such project.");
        var (list, index) = ActivityList.Of(owner, activity);
        var stored = index < list.Count ? DocumentReader.Bytes(list[index]) : null;
        if (stored is null && body.NeedsStored)
            return Problem.NotFound("There is no such activity to patch.");
        if (conditions.OfChanging(stored is null ? null : EntityTags.OfPart(ContentHash.Of(stored))) is { } refused)
            return refused;
        var after = body.Over(stored);
        if (!manages && SubmitLimits.OfActivity($"{project}/{activity}", stored, after) is { } forbidden)
            return forbidden;
        ActivityJson[] activities = [.. list.Take(index), after.Content, .. list.Skip(index + 1)];
        return new Draft
        {
            Projects =
            [
                new(owner with { Activities = activities }, path => ActivityList.PlaceOf(path, index, after.Place))
                {
                    SentActivities = new HashSet<int> { index },
                },
            ],
            Faults = after.Faults,
            Sent = body.Json,
            Creates = stored is null,
            Activity = after.Content,
        };
    }
}

/// <summary>Takes one activity out of its project.</summary>
internal sealed class ActivityRemoval(string project, string activity, Preconditions conditions)
{
    public async Task<Draft> DrawAsync(DocumentState state)
    {
        if (await state.ProjectAsync(project) is not { } owner)
            return Problem.NotFound("There is no such project.");
        var (list, index) = ActivityList.Of(owner, activity);
        if (index == list.Count)
            return Problem.NotFound("There is no such activity.");
        if (conditions.OfReplacing(EntityTags.OfPart(ContentHash.Of(DocumentReader.Bytes(list[index])))) is { } refused)
            return refused;
        ActivityJson[] left = [.. list.Take(index), .. list.Skip(index + 1)];
        return new Draft { Projects = [new(owner with { Activities = left }, _ => "")], Removes = true };
    }
}

/// <summary>Where an activity stands in its project.</summary>
internal static class ActivityList
{
    /// <summary>All activities and the place of this one; behind the last when there is no such.</summary>
    public static (IReadOnlyList<ActivityJson> All, int Index) Of(ProjectJson project, string activity)
    {
        var all = project.Activities ?? [];
        var index = 0;
        while (index < all.Count && all[index].Id != activity)
            index++;
        return (all, index);
    }

    /// <summary>From a pointer into the project to one into the activity that was sent at this place; "" for all else.</summary>
    public static string PlaceOf(string path, int index, Func<string, string> place)
    {
        var here = FormattableString.Invariant($"/activities/{index}");
        return path == here || path.StartsWith(here + "/", StringComparison.Ordinal) ? place(path[here.Length..]) : "";
    }
}
