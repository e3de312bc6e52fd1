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
        return new PortfolioDocument(settings, reading.List(whole, "projects", Projects, (project, path) => project.ToModel(reading, path)));
    }
}
