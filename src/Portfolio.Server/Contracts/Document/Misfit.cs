using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Something inside a distribution or a link that could not be read, kept until all faults are reported together.</summary>
/// <param name="Path">Pointer below the distribution or link: "" for itself, <c>/outcomes/3/value</c>.</param>
internal readonly record struct Misfit(string Path, string Code, string Message)
{
    public void Report(Reading reading, Place place) => reading.Faults.Add(new Fault(place.Path + Path, place.Subject, Code, Message));

    public static Misfit Missing(string path, string member) => new(path, FaultCodes.MemberMissing, $"'{member}' is missing.");

    public static Misfit Unknown(string path, string member, string owner) =>
        new($"{path}/{Place.Escape(member)}", FaultCodes.MemberUnknown, $"{owner} has no member '{member}'.");

    public static Misfit Kind(string path, string member, string expected) =>
        new($"{path}/{Place.Escape(member)}", FaultCodes.MemberKind, $"'{member}' must be {expected}.");

    public static Misfit NotFinite(string path, string member) =>
        new($"{path}/{Place.Escape(member)}", FaultCodes.NumberNotFinite, $"'{member}' is too large to be a number here.");
}
