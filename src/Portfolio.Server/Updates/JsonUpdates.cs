using System.Globalization;
using System.Text.Json.Nodes;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Updates;

/// <summary>Updates sent as JSON.</summary>
internal static class JsonUpdates
{
    private const string Missing = "'{0}' is missing.";

    /// <exception cref="JsonRefused">Not JSON of the right shape.</exception>
    public static UpdateSet Read(ReadOnlyMemory<byte> json, DocumentReader reader)
    {
        // Read as what it must be first, to say what is not; members are then taken as they stand, since null is not the same as absent.
        reader.ReadUpdates(json.Span);
        var set = new UpdateSet { Json = json };
        if (JsonObject.Create(reader.ReadAny(json.Span))?["updates"] is JsonArray entries)
            ForEach(entries, "/updates", (entry, path) => Add(set, entry, path));
        else
            Refuse(set, "", "updates", "updates");
        return set;
    }

    private static void Add(UpdateSet set, JsonObject entry, string path)
    {
        if ((string?)entry["project"] is not { } id)
        {
            Refuse(set, path, path[1..], "project");
            return;
        }
        var project = set.Of(id, $"{path}/project");
        if (project.Own is null && entry.TryGetPropertyValue("activities", out var sent))
        {
            var mayCreate = (bool?)entry["create"] == true;
            ForEach(sent as JsonArray ?? throw JsonRefused.Null($"{path}/activities"), $"{path}/activities",
                (activity, at) => Add(set, project, activity, at, mayCreate));
        }
        foreach (var name in new[] { "project", "create", "activities" })
            entry.Remove(name);
        set.Add(project, new SentThing(path, $"{path}/project", entry));
    }

    private static void Add(UpdateSet set, ProjectUpdate project, JsonObject activity, string path, bool mayCreate)
    {
        if ((string?)activity["id"] is not { } id)
        {
            Refuse(set, path, project.Id, "id");
            return;
        }
        activity.Remove("id");
        set.Add(project, new ActivityUpdate(id, new SentThing(path, $"{path}/id", activity), mayCreate));
    }

    private static void ForEach(JsonArray list, string path, Action<JsonObject, string> each)
    {
        for (var i = 0; i < list.Count; i++)
        {
            var at = string.Create(CultureInfo.InvariantCulture, $"{path}/{i}");
            each(list[i] as JsonObject ?? throw JsonRefused.Null(at), at);
        }
    }

    private static void Refuse(UpdateSet set, string path, string subject, string member) =>
        set.Faults.Add(new Fault(path, subject, FaultCodes.MemberMissing, string.Format(CultureInfo.InvariantCulture, Missing, member)));
}
