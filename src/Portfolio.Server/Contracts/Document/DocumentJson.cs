using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A whole portfolio: its settings and its projects.</summary>
public sealed record DocumentJson
{
    public SettingsJson? Settings { get; init; }

    public IReadOnlyList<ProjectJson>? Projects { get; init; }

    internal PortfolioDocument ToModel(Reading reading)
    {
        var whole = new Place("", "document");
        if (Settings is null)
            reading.Missing(whole, "settings");
        if (Projects is null)
            reading.Missing(whole, "projects");
        var settings = (Settings ?? SettingsJson.Absent).ToModel(Settings is null ? new Reading() : reading, "/settings");
        return new PortfolioDocument(settings, ProjectsToModel(reading));
    }

    private Project[] ProjectsToModel(Reading reading)
    {
        var read = SideBySide.Each(Projects ?? [], (project, index) =>
        {
            var (own, path) = (new Reading(), $"/projects/{index}");
            return (Project: (project ?? throw JsonRefused.Null(path)).ToModel(own, path), own.Faults);
        });
        reading.Faults.AddRange(read.SelectMany(each => each.Faults));
        return Array.ConvertAll(read, each => each.Project);
    }
}

/// <summary>A portfolio as a key sees it: one that is limited to projects sees these alone, and no settings.</summary>
public sealed record SeenDocumentJson
{
    public SettingsJson? Settings { get; init; }

    public required IReadOnlyList<ProjectJson> Projects { get; init; }
}
