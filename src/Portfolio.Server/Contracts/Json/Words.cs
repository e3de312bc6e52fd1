using Portfolio.Model.Documents;

namespace Portfolio.Server.Contracts.Json;

/// <summary>The words a member may say and what each means in the model.</summary>
public sealed class Words<T>(params (string Word, T Meaning)[] entries)
    where T : struct, Enum
{
    public IReadOnlyList<string> All { get; } = [.. entries.Select(entry => entry.Word)];

    public T? Meaning(string word)
    {
        foreach (var entry in entries)
            if (string.Equals(entry.Word, word, StringComparison.Ordinal))
                return entry.Meaning;
        return null;
    }
}

/// <summary>Every closed list of words in the portfolio document.</summary>
public static class Words
{
    public static readonly Words<DayOfWeek> Weekdays = new(
        ("mon", DayOfWeek.Monday), ("tue", DayOfWeek.Tuesday), ("wed", DayOfWeek.Wednesday), ("thu", DayOfWeek.Thursday),
        ("fri", DayOfWeek.Friday), ("sat", DayOfWeek.Saturday), ("sun", DayOfWeek.Sunday));

    public static readonly Words<PoolRule> PoolRules = new(("passing", PoolRule.Passing), ("inOrder", PoolRule.InOrder));

    public static readonly Words<MatrixRepair> Repairs = new(("refuse", MatrixRepair.Refuse), ("nearest", MatrixRepair.Nearest));

    public static readonly Words<LinkType> LinkTypes = new(
        ("FS", LinkType.FinishToStart), ("SS", LinkType.StartToStart), ("FF", LinkType.FinishToFinish), ("SF", LinkType.StartToFinish));
}
