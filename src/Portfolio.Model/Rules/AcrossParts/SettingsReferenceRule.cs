using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.AcrossParts;

/// <summary>Projects, programmes and activities that the settings name: in commitments, pairs, impacts and responses.</summary>
internal static class SettingsReferenceRule
{
    public static IEnumerable<Fault> Check(Settings settings, Place at, OutlineIndex whole) =>
    [
        .. Commitments(settings, at, whole),
        .. Pairs(settings.Dependence, at, whole),
        .. Events(settings.RiskEvents, at, whole),
    ];

    private static IEnumerable<Fault> Commitments(Settings settings, Place at, OutlineIndex whole) =>
        from programme in settings.ProgrammeCommitments.Keys
        where TextRule.IsId(programme) && !whole.HasProgramme(programme)
        select at.Under("commitments").Under("programmes").UnderKey(programme).About("programme/" + programme).Fault(
            RuleCodes.ProgrammeUnknown, $"No project belongs to the programme {programme}, so nothing can be promised for it.");

    private static IEnumerable<Fault> Pairs(Dependence dependence, Place at, OutlineIndex whole)
    {
        for (var i = 0; i < dependence.Pairs.Count; i++)
        {
            var pair = dependence.Pairs[i];
            var place = at.Under("dependence").Under("pairs", i);
            if (Node(pair.First, place.Under("between", 0), whole) is { } first) yield return first;
            if (Node(pair.Second, place.Under("between", 1), whole) is { } second) yield return second;
        }
    }

    private static Fault? Node(string text, Place at, OutlineIndex whole) => PairNode.Parse(text) switch
    {
        { Kind: NodeKind.Project, Id: var id } when whole.Find(id) < 0 => at.Fault(RuleCodes.ProjectUnknown, $"There is no project {id}."),
        { Kind: NodeKind.Programme, Id: var id } when !whole.HasProgramme(id) =>
            at.Fault(RuleCodes.ProgrammeUnknown, $"No project belongs to the programme {id}."),
        _ => null,
    };

    private static IEnumerable<Fault> Events(IReadOnlyList<RiskEvent> events, Place settingsAt, OutlineIndex whole)
    {
        for (var i = 0; i < events.Count; i++)
        {
            var at = settingsAt.Under("riskEvents", i).About("event/", events[i].Id, i);
            foreach (var fault in Impacts(events[i].Impacts, at, whole)) yield return fault;
            for (var k = 0; k < events[i].Responses.Count; k++)
            {
                var (response, place) = (events[i].Responses[k], at.Under("responses", k));
                foreach (var fault in Impacts(response.Impacts, place, whole)) yield return fault;
                if (response.Project is { } payer && whole.Find(payer) < 0)
                    yield return place.Under("project").Fault(
                        RuleCodes.ProjectUnknown, $"The response {response.Id} is paid by {TextRule.Shown(payer)}, but there "
                        + "is no such project.");
            }
        }
    }

    private static IEnumerable<Fault> Impacts(IReadOnlyList<Impact> impacts, Place at, OutlineIndex whole)
    {
        for (var k = 0; k < impacts.Count; k++)
        {
            var (activity, project) = (impacts[k].Activity, impacts[k].Project);
            var place = at.Under("impacts", k);
            if (project is null && activity?.Split('/') is [{ Length: > 0 } owner, { Length: > 0 } name]
                && whole.Missing(owner, name) is var (code, reason))
                yield return place.Under("activity").Fault(code, $"The event acts on {TextRule.Shown(activity)}, but {reason}.");
            else if (activity is null && project is not null && whole.Find(project) < 0)
                yield return place.Under("project").Fault(RuleCodes.ProjectUnknown,
                    $"The event acts on {TextRule.Shown(project)}, but there is no such project.");
        }
    }
}
