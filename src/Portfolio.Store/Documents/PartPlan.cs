namespace Portfolio.Store.Documents;

/// <summary>A row of a revision: one part that it changes, moves or (without hash) removes.</summary>
internal sealed record PlannedPart(string Project, long Position, string? Before, string? After, ProposedPart? Proposed);

/// <summary>From a head and a proposed change to the rows of the next revision: only what differs.</summary>
internal static class PartPlan
{
    /// <exception cref="ArgumentException">The change contradicts itself or the head: the program's mistake, not the author's.</exception>
    public static IReadOnlyList<PlannedPart> Make(IReadOnlyList<PartRow> head, Change change)
    {
        var before = head.ToDictionary(row => row.Project, StringComparer.Ordinal);
        var sent = change.Parts.ToDictionary(part => part.Project, StringComparer.Ordinal);
        var removed = change.Removed.Where(before.ContainsKey).ToHashSet(StringComparer.Ordinal);
        if (removed.Overlaps(sent.Keys))
            throw new ArgumentException("A part is both changed and removed.", nameof(change));
        var rows = new List<PlannedPart>();
        var last = -1L;
        string[] present = [.. head.Select(row => row.Project)];
        foreach (var project in Sequence(present, [.. change.Parts.Select(part => part.Project)], removed, change))
        {
            var old = before.GetValueOrDefault(project);
            last = project == PartNames.Settings ? 0 : Math.Max(old is not null && old.Position > last ? old.Position : last + 1, 1);
            var part = sent.GetValueOrDefault(project);
            var hash = part?.Hash ?? old!.Hash;
            if (old is null || old.Hash != hash || old.Position != last)
                rows.Add(new PlannedPart(project, last, old?.Hash, hash, part));
        }
        rows.AddRange(head.Where(row => removed.Contains(row.Project))
            .Select(row => new PlannedPart(row.Project, row.Position, row.Hash, null, null)));
        return rows;
    }

    /// <summary>The parts in their new order, settings first.</summary>
    private static IEnumerable<string> Sequence(string[] before, string[] sent, HashSet<string> removed, Change change)
    {
        string[] kept = [.. before.Where(project => !removed.Contains(project)), .. sent.Except(before, StringComparer.Ordinal)];
        var projects = kept.Where(project => project != PartNames.Settings).ToArray();
        if (change.Order is { } order)
        {
            if (order.Count != projects.Length || !projects.ToHashSet(StringComparer.Ordinal).SetEquals(order))
                throw new ArgumentException("The order does not name exactly the projects that are left.", nameof(change));
            projects = [.. order];
        }
        return kept.Length == projects.Length ? projects : [PartNames.Settings, .. projects];
    }
}
