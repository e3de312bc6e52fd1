using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>What was promised.</summary>
public sealed record CommitmentsJson
{
    public string? Finish { get; init; }

    /// <summary>Exact money in the portfolio's currency.</summary>
    [JsonConverter(typeof(AmountConverter))]
    public decimal? Budget { get; init; }

    internal Commitments ToModel(Reading reading, Place place) =>
        new(reading.Date(place, "finish", Finish), reading.Money(place, "budget", Budget));
}

/// <summary>What was promised for the portfolio and for its programmes.</summary>
public sealed record PortfolioCommitmentsJson
{
    public string? Finish { get; init; }

    /// <summary>Exact money in the portfolio's currency.</summary>
    [JsonConverter(typeof(AmountConverter))]
    public decimal? Budget { get; init; }

    /// <summary>Commitments by programme id.</summary>
    public IReadOnlyDictionary<string, CommitmentsJson>? Programmes { get; init; }

    internal Commitments ToModel(Reading reading, Place place) =>
        new(reading.Date(place, "finish", Finish), reading.Money(place, "budget", Budget));

    internal Dictionary<string, Commitments> ProgrammesToModel(Reading reading, string path)
    {
        var byProgramme = new Dictionary<string, Commitments>(StringComparer.Ordinal);
        foreach (var (programme, commitments) in Programmes ?? new Dictionary<string, CommitmentsJson>())
        {
            var place = new Place($"{path}/{Place.Escape(programme)}", $"programme/{programme}");
            byProgramme.Add(programme, (commitments ?? throw JsonRefused.Null(place.Path)).ToModel(reading, place));
        }
        return byProgramme;
    }
}
