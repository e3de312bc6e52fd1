using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules.OfDistributions;

namespace Portfolio.Model.Rules;

/// <summary>Risk events with their impacts and responses, of the settings or of a project.</summary>
internal static class RiskEventRule
{
    public static IEnumerable<Fault> Check(IReadOnlyList<RiskEvent> events, EventOwner owner)
    {
        foreach (var fault in Ids.Check(events, e => e.Id, "event", i => owner.EventAt(i, events[i].Id))) yield return fault;
        for (var i = 0; i < events.Count; i++)
        {
            var (risk, at) = (events[i], owner.EventAt(i, events[i].Id));
            if (TextRule.Name(risk.Name, "name", () => at.Under("name")) is { } name) yield return name;
            if (ValueRule.Probability(risk.Probability, "the event", () => at.Under("probability")) is { } chance) yield return chance;
            foreach (var fault in Impacts(risk.Impacts, owner, at)) yield return fault;
            foreach (var fault in Responses(risk, owner, at)) yield return fault;
        }
    }

    private static IEnumerable<Fault> Impacts(IReadOnlyList<Impact> impacts, EventOwner owner, Place at)
    {
        for (var k = 0; k < impacts.Count; k++)
        {
            var (impact, place) = (impacts[k], at.Under("impacts", k));
            if (impact.Delay is null && impact.Cost is null)
                yield return place.Fault(RuleCodes.ImpactEmpty, "The impact has neither a delay nor a cost, so it would do nothing.");
            if (owner.Target(impact, place) is { } target) yield return target;
            foreach (var flaw in DistributionRule.Flaws(impact.Delay, Quantity.Delay, owner.Limits))
                yield return flaw.At(place.Under("delay"));
            foreach (var flaw in DistributionRule.Flaws(impact.Cost, Quantity.EventCost, owner.Limits))
                yield return flaw.At(place.Under("cost"));
        }
    }

    private static IEnumerable<Fault> Responses(RiskEvent risk, EventOwner owner, Place at)
    {
        var responses = risk.Responses;
        foreach (var fault in Ids.Check(responses, r => r.Id, "response", k => at.Under("responses", k))) yield return fault;
        var taken = false;
        for (var k = 0; k < responses.Count; k++)
        {
            var (response, place) = (responses[k], at.Under("responses", k));
            if (TextRule.Name(response.Name, "name", () => place.Under("name")) is { } name) yield return name;
            if (ValueRule.Money(response.Cost, owner.MinorDigits, () => place.Under("cost"), negativeAllowed: true) is { } cost)
                yield return cost;
            if (ValueRule.Probability(response.Probability, "the event after the response", () => place.Under("probability")) is { } chance)
                yield return chance;
            foreach (var fault in Impacts(response.Impacts, owner, place)) yield return fault;
            if (owner.Payer(response, place) is { } payer) yield return payer;
            if (response.Taken && taken)
                yield return place.Under("taken").Fault(
                    RuleCodes.ResponseSeveralTaken, $"The response {response.Id} is taken beside another one; at most one "
                    + "response to an event can be.");
            taken |= response.Taken;
        }
    }
}
