using System.Globalization;
using System.Text.Json;
using System.Text.Json.Nodes;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Documents;
using Portfolio.Server.Documents.Parts;

namespace Portfolio.Server.Updates;

/// <summary>One stored project with an update laid over it.</summary>
internal sealed class ProjectMerge
{
    private readonly ProjectUpdate update;
    private readonly ProjectJson before;

    // By place in the merged project.
    private readonly SortedDictionary<int, ActivityUpdate> touched = [];

    /// <param name="stored">Canonical bytes.</param>
    /// <param name="faults">Where activities that are not there are reported.</param>
    public ProjectMerge(ProjectUpdate update, byte[] stored, List<Fault> faults)
    {
        this.update = update;
        before = DocumentReader.OfStored.ReadProject(stored);
        var project = JsonNode.Parse(stored)!.AsObject();
        if (update.Own is { } own)
            UpdateMerge.Over(project, own.Members);
        LayActivities(project, faults);
        After = new PartDraft<ProjectJson>(Read(project), Place);
    }

    public PartDraft<ProjectJson> After { get; }

    /// <summary>Members that the right to submit does not reach.</summary>
    public IEnumerable<Fault> BeyondSubmit()
    {
        var own = SubmitLimits.FaultsOfProject(
            update.Id, DocumentReader.Bytes(before with { Activities = null }),
            new PartContent<ProjectJson>(After.Content with { Activities = null }, [], Place));
        return own.Concat(touched.SelectMany(pair => SubmitLimits.FaultsOfActivity(
            $"{update.Id}/{pair.Value.Id}", StoredActivity(pair.Key),
            new PartContent<ActivityJson>(After.Content.Activities![pair.Key], [], path => PlaceIn(pair.Value.Sent, path)))));
    }

    private byte[]? StoredActivity(int place) =>
        before.Activities is { } all && place < all.Count ? DocumentReader.Bytes(all[place]) : null;

    private void LayActivities(JsonObject project, List<Fault> faults)
    {
        if (!update.Activities.Any())
            return;
        if (project["activities"] is not JsonArray list)
            project["activities"] = list = [];
        var places = new Dictionary<string, int>(StringComparer.Ordinal);
        for (var i = 0; i < list.Count; i++)
            places[(string)list[i]!["id"]!] = i;
        foreach (var activity in update.Activities)
        {
            if (!places.TryGetValue(activity.Id, out var place))
            {
                if (!activity.MayCreate)
                {
                    faults.Add(Unknown(activity));
                    continue;
                }
                place = list.Count;
                list.Add(new JsonObject { ["id"] = activity.Id });
            }
            touched.Add(place, activity);
            UpdateMerge.OverActivity(list[place]!.AsObject(), activity.Sent.Members);
        }
    }

    private Fault Unknown(ActivityUpdate activity) => new(
        activity.Sent.IdPath, $"{update.Id}/{activity.Id}", RuleCodes.ActivityUnknown,
        $"{update.Id} has no activity {activity.Id}; 'create' adds it.");

    private ProjectJson Read(JsonObject merged)
    {
        try
        {
            return DocumentReader.OfStored.ReadProject(JsonSerializer.SerializeToUtf8Bytes(merged, DocumentReader.AnyType));
        }
        catch (JsonRefused refused)
        {
            // Line and column would be those of the merged text, which nobody sent.
            throw new JsonRefused(refused.Fault with { Path = Place(refused.Fault.Path) });
        }
    }

    /// <summary>From a pointer into the merged project to one into what was sent; "" for what is stored.</summary>
    private string Place(string path)
    {
        const string list = "/activities/";
        if (!path.StartsWith(list, StringComparison.Ordinal))
            return update.Own is { } own ? PlaceIn(own, path) : path.Length == 0 ? update.IdPath : "";
        var end = path.IndexOf('/', list.Length);
        var number = end < 0 ? path[list.Length..] : path[list.Length..end];
        return touched.TryGetValue(int.Parse(number, CultureInfo.InvariantCulture), out var activity)
            ? PlaceIn(activity.Sent, end < 0 ? "" : path[end..])
            : "";
    }

    private static string PlaceIn(SentThing thing, string path) => path switch
    {
        "" => thing.Path,
        "/id" => thing.IdPath,
        _ => SentPointers.OrStored(thing.Members, path).Length > 0 ? thing.Path + path : "",
    };
}
