using Portfolio.Model.Documents;

namespace Portfolio.Model.Tests.Rules;

/// <summary>One row of a rule's table: a document with one mistake and the fault it gives, and its nearest sound neighbour.</summary>
internal sealed record RuleCase(string Code, string Path, string Subject, PortfolioDocument Broken, PortfolioDocument Sound)
{
    public RuleCase(string code, string path, string subject, PortfolioDocument broken)
        : this(code, path, subject, broken, Rules.Sound.Document)
    {
    }
}
