using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>A predecessor: the id of an activity (project/activity reaches another project), or an object with type and lag.</summary>
[JsonConverter(typeof(LinkConverter))]
public sealed record LinkJson
{
    public string? Activity { get; init; }

    /// <summary>FS, SS, FF or SF. Left out: FS.</summary>
    public string? Type { get; init; }

    /// <summary>Working days; negative: a lead. Left out: 0.</summary>
    public double? Lag { get; init; }

    /// <summary>True when it was sent as a plain text.</summary>
    internal bool Plain { get; init; }

    /// <summary>What inside it could not be read.</summary>
    internal IReadOnlyList<Misfit> Misfits { get; init; } = [];

    internal Link ToModel(Reading reading, Place place)
    {
        foreach (var misfit in Misfits)
            misfit.Report(reading, place);
        if (string.IsNullOrEmpty(Activity) && Misfits.All(misfit => misfit.Path != "/activity"))
            reading.Missing(place, "activity");
        var type = reading.Word(place, "type", Type, Words.LinkTypes, FaultCodes.TypeUnknown);
        return new Link(Activity ?? "", type ?? LinkType.FinishToStart, reading.Number(place, "lag", Lag) ?? 0);
    }
}
