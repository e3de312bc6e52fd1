using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>Links into other projects: what they name must be there.</summary>
internal static class ForeignLinkRule
{
    public static IEnumerable<Fault> Check(OutlineIndex whole)
    {
        for (var p = 0; p < whole.Projects.Count; p++)
        {
            var outline = whole.Projects[p].Outline;
            foreach (var link in outline.ForeignLinks)
            {
                if (whole.Missing(link.Project!, link.Activity!) is not var (code, reason)) continue;
                yield return whole.ActivityAt(p, link.Successor).Under("predecessors", link.Entry).Fault(
                    code,
                    $"{outline.ActivityIds[link.Successor]} waits for {TextRule.Shown($"{link.Project}/{link.Activity}")}, but {reason}.");
            }
        }
    }
}
