using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules.OfDistributions;

/// <summary>What is wrong with a distribution. <paramref name="Member"/> is relative to it, such as <c>outcomes/2/probability</c>; "" is
/// the whole.</summary>
internal readonly record struct Flaw(string Member, string Code, string Message)
{
    public static readonly Flaw[] None = [];

    public Fault At(Place place) => (Member.Length == 0 ? place : place.Under(Member)).Fault(Code, Message);
}
