using Portfolio.Model.Faults;
using Portfolio.Server.Contracts;

namespace Portfolio.Server.Updates;

/// <summary>How faults name their places in what was sent: by pointers into JSON, or by lines and columns of a table.</summary>
internal interface IFaultPlaces
{
    IReadOnlyList<FaultJson> Of(IReadOnlyList<Fault> faults);
}

/// <summary>Pointers are what faults carry.</summary>
internal sealed class SentAsJson : IFaultPlaces
{
    public static readonly SentAsJson Instance = new();

    public IReadOnlyList<FaultJson> Of(IReadOnlyList<Fault> faults) => [.. faults.Select(FaultJson.From)];
}
