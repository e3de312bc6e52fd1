using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Documents;

/// <summary>
/// The one place where a document that was sent is judged: its shape (contract types), its meaning (the model's rules) and what only
/// arithmetic can tell (the engine's pure checks). All faults come together, in the order of the JSON that was sent.
/// </summary>
/// <param name="limits">Largest sizes that are accepted.</param>
internal sealed class DocumentCheck(ModelLimits limits)
{
    /// <summary>The valid portfolio, or null with every fault found.</summary>
    /// <param name="json">The same document as it was sent; looked at only to put faults in order.</param>
    public ValidPortfolio? Check(DocumentJson document, ReadOnlySpan<byte> json, out IReadOnlyList<Fault> faults)
    {
        var reading = new Reading();
        var model = document.ToModel(reading);
        var valid = ValidPortfolio.Check(model, limits, out var broken);
        var found = Together(model, document.Settings is null, reading.Faults, broken);
        faults = found.Count == 0 ? [] : DocumentOrder.Sort(found, json);
        return faults.Count == 0 ? valid : null;
    }

    /// <summary>
    /// A rule that speaks of a member which could not be read repeats what is already said: the faults of both without such.
    /// </summary>
    public static List<Fault> WithoutRepetition(IReadOnlyList<Fault> shape, IEnumerable<Fault> rules)
    {
        var unread = shape.Where(fault => fault.Code != FaultCodes.MemberMissing)
            .Select(fault => fault.Path).ToHashSet(StringComparer.Ordinal);
        return [.. shape, .. rules.Where(fault => !unread.Contains(fault.Path))];
    }

    private static List<Fault> Together(PortfolioDocument model, bool withoutSettings, List<Fault> shape, IReadOnlyList<Fault> rules)
    {
        // Rules of settings that were not sent say nothing that is not said already.
        var found = WithoutRepetition(
            shape, rules.Where(fault => !(withoutSettings && fault.Path.StartsWith("/settings", StringComparison.Ordinal))));
        found.AddRange(ArithmeticChecks.Of(model, found));
        return found;
    }
}
