namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>What a distribution stands for: its name in messages, how large it may be, and whether it may be negative.</summary>
internal sealed record Quantity(string Name, double Bound, string Unit, bool NegativeAllowed = false)
{
    public static readonly Quantity Duration = new("duration", Bounds.WorkingDays, "working days");

    public static readonly Quantity Remaining = new("remaining work", Bounds.WorkingDays, "working days");

    public static readonly Quantity Delay = new("delay", Bounds.WorkingDays, "working days");

    public static readonly Quantity Factor = new("factor", Bounds.Factor, "times");

    public static readonly Quantity ActivityCost = new("cost", Bounds.Money, "units of the currency");

    /// <summary>An event may also save money.</summary>
    public static readonly Quantity EventCost = new("cost", Bounds.Money, "units of the currency", NegativeAllowed: true);
}
