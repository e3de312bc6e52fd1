namespace Portfolio.Engine.Networks;

/// <summary>Order of a network by its links (Kahn 1962, with a heap).</summary>
internal static class Topology
{
    /// <summary>
    /// Activities so that each comes after its predecessors; among those that are free the lowest index first, so that parts that are
    /// not linked do not disturb each other's order.
    /// </summary>
    /// <exception cref="ArgumentException">The links form a cycle; rules refuse such documents.</exception>
    public static int[] Order(int[] linkStart, int[] successorStart, int[] successors) =>
        Order(linkStart, successorStart, successors, null);

    /// <summary>As above, among those that are free the lowest rank first, then the lowest index.</summary>
    public static int[] Order(Network network, int[] rank) => Order(network.LinkStart, network.SuccessorStart, network.Successors, rank);

    private static int[] Order(int[] linkStart, int[] successorStart, int[] successors, int[]? rank)
    {
        var n = linkStart.Length - 1;
        var left = new int[n];
        var free = new PriorityQueue<int, (int, int)>();
        for (var a = 0; a < n; a++)
        {
            left[a] = linkStart[a + 1] - linkStart[a];
            if (left[a] == 0)
                free.Enqueue(a, (rank?[a] ?? 0, a));
        }
        var order = new int[n];
        var count = 0;
        while (free.TryDequeue(out var a, out _))
        {
            order[count++] = a;
            for (var s = successorStart[a]; s < successorStart[a + 1]; s++)
            {
                var successor = successors[s];
                if (--left[successor] == 0)
                    free.Enqueue(successor, (rank?[successor] ?? 0, successor));
            }
        }
        return count == n ? order : throw new ArgumentException("The network has a cycle.", nameof(successors));
    }
}
