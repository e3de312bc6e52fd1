using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>Ids of a list of things: their form, and that each occurs once; a duplicate is reported at the second.</summary>
internal static class Ids
{
    public static IEnumerable<Fault> Check<T>(IReadOnlyList<T> things, Func<T, string?> id, string what, Func<int, Place> at)
    {
        var first = new Dictionary<string, int>(things.Count, StringComparer.Ordinal);
        for (var i = 0; i < things.Count; i++)
        {
            if (id(things[i]) is not { Length: > 0 } name) continue;
            if (!TextRule.IsId(name)) yield return TextRule.Id(name, () => at(i).Under("id"))!;
            else if (!first.TryAdd(name, i))
                yield return at(i).Under("id").Fault(
                    RuleCodes.IdDuplicate, $"The id {name} is used twice: {what} {first[name] + 1} in the list has it already.");
        }
    }
}
