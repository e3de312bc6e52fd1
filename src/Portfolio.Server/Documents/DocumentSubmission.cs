using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>
/// A whole document as it was sent: either the parts to store or the problem with it. Read and checked before any transaction.
/// </summary>
internal sealed class DocumentSubmission
{
    private static readonly Fault CurrencyMark = new("/settings/currency", "settings", FaultCodes.CurrencyFixed, "");

    private readonly IReadOnlyList<ProposedPart> parts = [];
    private readonly string? currency;
    private readonly Problem? problem;
    private readonly IReadOnlyList<Fault> faults = [];
    private readonly int currencyPlace;

    private DocumentSubmission(Problem problem) => this.problem = problem;

    /// <param name="faults">In the order of <paramref name="json"/>.</param>
    private DocumentSubmission(DocumentJson document, IReadOnlyList<Fault> faults, ReadOnlySpan<byte> json)
    {
        (currency, this.faults) = (document.Settings?.Currency, faults);
        // Whether the currency is fixed is known only when what is stored is looked at, and the JSON is gone then.
        currencyPlace = DocumentOrder.Sort([.. faults, CurrencyMark], json).ToList().IndexOf(CurrencyMark);
    }

    private DocumentSubmission(DocumentJson document, ValidPortfolio valid)
    {
        currency = document.Settings!.Currency;
        parts =
        [
            new ProposedPart(PartNames.Settings, DocumentReader.Bytes(document.Settings)),
            .. SideBySide.Each(document.Projects!, (project, i) =>
                new ProposedPart(project.Id!, DocumentReader.Bytes(project), OutlineOf(valid.Document.Projects[i]))),
        ];
        Tag = EntityTags.OfDocument(parts.Select(part => new PartHead(part.Project, part.Hash))).ToString();
    }

    /// <summary>Entity tag of the document once it is stored.</summary>
    public string? Tag { get; }

    /// <param name="portfolio">The id in the address, judged with the rest.</param>
    public static DocumentSubmission Of(string portfolio, ReadOnlyMemory<byte> json, DocumentReader reader, DocumentCheck check)
    {
        try
        {
            var document = reader.ReadDocument(json);
            var valid = check.Check(document, json.Span, out var faults);
            faults = [.. PortfolioRules.CheckId(portfolio), .. faults];
            return valid is null || faults.Count > 0
                ? new DocumentSubmission(document, faults, json.Span)
                : new DocumentSubmission(document, valid);
        }
        catch (JsonRefused refused)
        {
            return new DocumentSubmission(Problem.Malformed(refused));
        }
    }

    private static byte[] OutlineOf(Project project) => OutlineBytes.Write(ProjectOutline.Of(project));

    /// <summary>Looks at what is there now and proposes to replace it whole.</summary>
    public async Task<Proposal> ReplaceAsync(Head? head, Preconditions conditions)
    {
        var refused = conditions.OfReplacing(head is null ? null : EntityTags.OfDocument(head.Parts))
            ?? problem ?? await RefusedAsync(head);
        return refused is null ? Change.Everything(head, parts) : new Refusal(refused);
    }

    private async Task<Problem?> RefusedAsync(Head? head)
    {
        var found = faults.ToList();
        if (head is not null && !found.Exists(fault => fault.Path == CurrencyMark.Path)
            && await FixedCurrency.CheckAsync(head, await head.ReadAsync(PartNames.Settings), currency, CurrencyMark.Path) is { } change)
            found.Insert(currencyPlace, change);
        return found.Count > 0 ? Problem.Refused(found) : null;
    }
}
