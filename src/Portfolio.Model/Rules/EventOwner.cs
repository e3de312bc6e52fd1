using Portfolio.Model.Documents;
using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>Whose events are checked: the settings' or a project's. Only the targets of impacts and who pays for responses
/// differ.</summary>
internal sealed record EventOwner(Place At, ModelLimits Limits, int MinorDigits, PlacedProject? Project)
{
    public static EventOwner OfSettings(Settings settings, Place at, ModelLimits limits) =>
        new(at, limits, PortfolioContext.DigitsOf(settings.Currency), null);

    public static EventOwner OfProject(PlacedProject placed) => new(placed.Here, placed.Context.Limits, placed.Context.MinorDigits, placed);

    /// <summary>The event's place; its subject is <c>event/{id}</c>, in a project <c>{project}/event/{id}</c>.</summary>
    public Place EventAt(int index, string id) =>
        At.Under("riskEvents", index).About(Project is null ? "event/" : $"{Project.Here.Subject}/event/", id, index);

    /// <summary>What the impact acts on must be there; of a settings' event only the form can be seen without the projects.</summary>
    public Fault? Target(Impact impact, Place at) => Project is null ? TargetOfSettings(impact, at) : TargetOfProject(impact, at);

    public Fault? Payer(Response response, Place at) => (Project, response.Project) switch
    {
        (null, null) => at.Fault(
            RuleCodes.ResponsePayer, "A response to an event of the portfolio must name the project that pays for it."),
        ({ } own, not null) => at.Under("project").Fault(
            RuleCodes.ResponsePayer, "The response names a payer; responses in a project are always paid by it, "
            + $"here {own.Project.Id}."),
        _ => null,
    };

    private Fault? TargetOfProject(Impact impact, Place at)
    {
        if (impact.Project is not null)
            return at.Under("project").Fault(
                RuleCodes.ImpactTarget, "An event of a project acts on that project alone; leave "
                + $"{TextRule.Shown(impact.Project)} out or move the event to the settings.");
        if (impact.Activity is { } activity && !Project!.Has(activity))
            return at.Under("activity").Fault(
                RuleCodes.ActivityUnknown, $"The event acts on {TextRule.Shown(activity)}, which is no activity of {Project.Project.Id}.");
        return Delay(impact, at);
    }

    private static Fault? TargetOfSettings(Impact impact, Place at) => (impact.Activity, impact.Project) switch
    {
        (null, null) => at.Fault(RuleCodes.ImpactTarget,
            "The impact must name an activity as project/activity, or a project that bears the cost."),
        (not null, not null) => at.Fault(RuleCodes.ImpactTarget, "The impact names both an activity and a project; one of them is enough."),
        ({ } activity, null) when activity.Split('/') is not [{ Length: > 0 }, { Length: > 0 }] => at.Under("activity").Fault(
            RuleCodes.ImpactTarget, $"\"{TextRule.Shown(activity)}\" does not name an activity of a project; write it as "
            + "project/activity."),
        _ => Delay(impact, at),
    };

    private static Fault? Delay(Impact impact, Place at) =>
        impact.Delay is not null && impact.Activity is null
            ? at.Under("delay").Fault(RuleCodes.ImpactDelay,
                "A delay needs an activity that it delays; a project as a whole can only bear a cost.")
            : null;
}
