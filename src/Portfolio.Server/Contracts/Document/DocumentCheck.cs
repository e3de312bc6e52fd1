using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>
/// The one place where a document that was sent is judged: its shape (contract types), its meaning (the model's rules) and what only the
/// numbers can tell (the engine's pure checks). All faults come together, in the order of the JSON that was sent.
/// </summary>
public static class DocumentCheck
{
    /// <summary>The valid portfolio, or null with every fault found.</summary>
    /// <param name="json">The same document as it was sent; looked at only to put faults in order.</param>
    public static ValidPortfolio? Check(DocumentJson document, ReadOnlySpan<byte> json, out IReadOnlyList<Fault> faults)
    {
        var reading = new Reading();
        var model = document.ToModel(reading);
        var valid = ValidPortfolio.Check(model, out var broken);
        List<Fault> found = [.. reading.Faults, .. WithoutEchoes(broken, reading.Faults)];
        // The engine's pure checks (dependence matrix, stated percentiles) join here.
        faults = found.Count == 0 ? [] : DocumentOrder.Sort(found, json);
        return faults.Count == 0 ? valid : null;
    }

    /// <summary>A rule that speaks of a member which could not be read repeats what is already said.</summary>
    private static IEnumerable<Fault> WithoutEchoes(IReadOnlyList<Fault> rules, List<Fault> shape)
    {
        var unread = shape.Where(fault => fault.Code != FaultCodes.MemberMissing).Select(fault => fault.Path).ToHashSet(StringComparer.Ordinal);
        return rules.Where(fault => !unread.Contains(fault.Path));
    }
}
