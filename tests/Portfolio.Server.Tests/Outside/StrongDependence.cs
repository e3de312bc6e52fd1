using System.Text;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Outside;

/// <summary>
/// A small document whose spread comes from dependence: projects tied within and across programmes, drivers tied to the portfolio, to a
/// programme, to a project and to each other.
/// </summary>
internal static class StrongDependence
{
    public static byte[] Json()
    {
        var document = JsonNode.Parse(Settings)!;
        document["projects"] = Dice.List(new[] { "north", "north", "south", "south", null }.Select((programme, p) => Project(p, programme)));
        return Encoding.UTF8.GetBytes(document.ToJsonString());
    }

    private static JsonNode Project(int number, string? programme)
    {
        var project = JsonNode.Parse(
            """
            { "statusDate": "2027-01-04", "correlation": 0.8, "drivers": ["ground", "market", "yield"], "activities": [
                { "id": "A", "duration": { "type": "lognormal", "mean": 60, "sd": 30 }, "cost": { "fixed": { "type": "normal", "mean": 9000, "sd": 2000 } } },
                { "id": "B", "duration": { "type": "triangular", "low": 20, "mode": 30, "high": 90 }, "predecessors": ["A"], "cost": { "perDay": 100 } } ] }
            """)!;
        project["id"] = $"project-{number}";
        if (programme is not null)
            project["programme"] = programme;
        return project;
    }

    private const string Settings =
        """
        { "settings": { "name": "Ties", "currency": "EUR",
            "drivers": [
                { "id": "ground", "durationFactor": { "type": "uniform", "low": 0.5, "high": 2 } },
                { "id": "market", "costFactor": { "type": "uniform", "low": 0.5, "high": 2 }, "durationFactor": { "type": "uniform", "low": 0.8, "high": 1.6 } },
                { "id": "yield", "probability": 0.5, "durationFactor": { "type": "triangular", "low": 1, "mode": 1.5, "high": 3 } } ],
            "dependence": { "betweenProjects": 0.4, "withinProgramme": 0.8, "pairs": [
                { "between": ["driver/ground", "portfolio"], "rank": 0.6 },
                { "between": ["programme/north", "driver/market"], "rank": -0.5 },
                { "between": ["driver/market", "driver/yield"], "rank": 0.4 },
                { "between": ["project/project-4", "driver/yield"], "rank": 0.4 } ] } } }
        """;
}
