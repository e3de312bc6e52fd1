using System.Collections.Concurrent;

namespace Portfolio.Engine.Results;

/// <summary>Where a level stands among n values in rising order: its own rank and those of its sampling bounds, all 1…n.</summary>
public readonly record struct LevelRanks(Level Level, int Rank, SamplingRanks Sampling);

/// <summary>
/// The ranks of a fixed list of levels, worked out once for each number of iterations that is met: all projects share one,
/// a milestone on a branch has its own. Safe to share between threads.
/// </summary>
public sealed class RankTable(IReadOnlyList<Level> levels)
{
    private readonly ConcurrentDictionary<int, LevelRanks[]> known = new();

    /// <summary>The levels in the order in which they were given.</summary>
    public IReadOnlyList<Level> Levels { get; } = levels;

    /// <summary>The ranks of every level among n values, n at least 1.</summary>
    public IReadOnlyList<LevelRanks> For(int n) =>
        known.GetOrAdd(
            n, static (n, levels) => [.. levels.Select(level => new LevelRanks(level, level.Rank(n), SamplingRanks.Of(level, n)))], Levels);
}
