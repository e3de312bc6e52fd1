using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;

namespace Portfolio.Engine.Inputs;

/// <summary>One uncertain input: its marginal, the key of its draws and its base value (contract section 4, items 3, 9, 11).</summary>
internal sealed record Estimate(Marginal Marginal, ulong Key, double Base, bool Certain)
{
    /// <summary>Null for what is not stated.</summary>
    public static Estimate? Of(Distribution? stated, string key, Func<string, bool>? held)
    {
        if (stated is null)
            return null;
        var marginal = Marginal.Of(stated);
        return new Estimate(marginal, DrawKey.Hash(key), marginal.BaseValue, stated is Constant || held?.Invoke(key) == true);
    }
}
