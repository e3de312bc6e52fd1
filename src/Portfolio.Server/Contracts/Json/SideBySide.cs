namespace Portfolio.Server.Contracts.Json;

/// <summary>The projects of a document do not touch each other while they are read: each is worked on whatever processor is free.</summary>
internal static class SideBySide
{
    /// <summary>Results in the order of the items. When items fail, the exception of the first of them is thrown.</summary>
    public static T[] Each<TItem, T>(IReadOnlyList<TItem> items, Func<TItem, int, T> work)
    {
        // One alone needs no other processor, and waking one costs more than a small project.
        if (items.Count == 1)
            return [work(items[0], 0)];
        var results = new T[items.Count];
        try
        {
            Parallel.For(0, results.Length, i => results[i] = work(items[i], i));
        }
        catch (AggregateException)
        {
            // Which of them failed first by the clock is chance; one after the other it is the first in order.
            for (var i = 0; i < results.Length; i++)
                results[i] = work(items[i], i);
        }
        return results;
    }
}
