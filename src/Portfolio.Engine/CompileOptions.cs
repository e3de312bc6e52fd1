using Portfolio.Engine.Pools;

namespace Portfolio.Engine;

/// <summary>What a plan takes from outside its document.</summary>
/// <param name="KeepOrder">The order of rule <c>inOrder</c> of another plan, <see cref="Plan.Order"/>; scenarios and replays keep it. Null:
/// its own.</param>
/// <param name="Held">True for the keys of inputs that stay at their base (contract section 4, item 11, names the keys). Null:
/// none.</param>
public sealed record CompileOptions(IReadOnlyList<ActivityId>? KeepOrder = null, Func<string, bool>? Held = null)
{
    public static readonly CompileOptions None = new();
}
