namespace Portfolio.Engine.Networks;

/// <summary>
/// Which row holds what. Full: each activity its own rows. Compact, for chunks of iterations: a row is given back when the last successor
/// that reads it has been placed, so that what is worked on stays in the cache however large the portfolio is; only what the dispatcher
/// works on keeps its rows. Rows that nobody reads later are scratch.
/// </summary>
internal sealed class RowLayout
{
    private const int ScratchWork = 0, ScratchStart = 1, ScratchFinish = 2, Scratch = 3;

    private RowLayout(int activities, int rows) =>
        (Rows, Work, Start, Finish) = (rows, new int[activities], new int[activities], new int[activities]);

    public int Rows { get; private set; }

    /// <summary>[activity] row of its minutes of work.</summary>
    public int[] Work { get; }

    /// <summary>[activity] row of its starts.</summary>
    public int[] Start { get; }

    /// <summary>[activity] row of its finishes.</summary>
    public int[] Finish { get; }

    public static RowLayout Full(int activities)
    {
        var layout = new RowLayout(activities, 3 * activities);
        for (var a = 0; a < activities; a++)
            (layout.Work[a], layout.Start[a], layout.Finish[a]) = (3 * a, 3 * a + 1, 3 * a + 2);
        return layout;
    }

    public static RowLayout Compact(Network network, Stages stages)
    {
        var layout = new RowLayout(network.Count, Scratch);
        foreach (var activity in stages.Dispatched)
            (layout.Work[activity], layout.Start[activity], layout.Finish[activity]) = (layout.Rows++, layout.Rows++, layout.Rows++);
        int[] sequence = [.. stages.First, .. stages.After];
        var ends = LastReaders(network, sequence);
        var free = new Stack<int>();
        var releases = new List<int>?[sequence.Length];
        for (var place = 0; place < sequence.Length; place++)
        {
            var activity = sequence[place];
            if (!stages.IsDispatched(activity))
            {
                layout.Work[activity] = ScratchWork;
                layout.Start[activity] = layout.Take(ends[activity].Start, ScratchStart, free, releases);
                layout.Finish[activity] = layout.Take(ends[activity].Finish, ScratchFinish, free, releases);
            }
            foreach (var row in releases[place] ?? [])
                free.Push(row);
        }
        return layout;
    }

    private int Take(int lastReader, int scratch, Stack<int> free, List<int>?[] releases)
    {
        if (lastReader < 0)
            return scratch;
        var row = free.TryPop(out var old) ? old : Rows++;
        (releases[lastReader] ??= []).Add(row);
        return row;
    }

    // [activity] place in the sequence of the last successor that reads its start and its finish, −1 for none.
    private static (int Start, int Finish)[] LastReaders(Network network, int[] sequence)
    {
        var last = new (int Start, int Finish)[network.Count];
        Array.Fill(last, (-1, -1));
        for (var place = 0; place < sequence.Length; place++)
        {
            if (network.Finished(sequence[place]))
                continue;
            foreach (ref readonly var link in network.LinksOf(sequence[place]))
            {
                if (link.FromFinish)
                    last[link.Predecessor].Finish = place;
                else
                    last[link.Predecessor].Start = place;
            }
        }
        return last;
    }
}
