using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.WithinProject;

/// <summary>Activities of one project that wait for each other in a circle, one fault for each knot of circles.</summary>
internal static class CycleRule
{
    public static IEnumerable<Fault> Check(PlacedProject placed)
    {
        var outline = placed.Outline;
        var links = outline.Links.Where(l => l.Project is null).ToList();
        var arcs = links.ConvertAll(l => new Arc(l.Predecessor, l.Successor));
        foreach (var cycle in CycleSearch.Find(outline.ActivityIds.Count, arcs))
        {
            // What was stored had no circle: each goes through something that was sent.
            var link = links[cycle.FirstOrDefault(a => placed.Sent?.Contains(links[a].Successor) != false, cycle[0])];
            yield return placed.Activity(link.Successor).Under("predecessors", link.Entry).Fault(
                RuleCodes.LinkCycle, CycleSearch.Message(cycle.Select(a => outline.ActivityIds[links[a].Successor])));
        }
    }
}
