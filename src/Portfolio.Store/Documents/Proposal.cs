namespace Portfolio.Store.Documents;

/// <summary>What the one who checks a write makes of it: a <see cref="Change"/> or a <see cref="Refusal"/>.</summary>
public abstract record Proposal
{
    private protected Proposal()
    {
    }
}

/// <summary>A part as it shall be.</summary>
/// <param name="Project">The project's id, or <see cref="PartNames.Settings"/>.</param>
/// <param name="Bytes">Its canonical bytes. Equal to what is stored: no change.</param>
/// <param name="Outline">Kept beside the content for <see cref="Head.ReadOutlinesAsync"/>; null: none.</param>
public sealed record ProposedPart(string Project, byte[] Bytes, byte[]? Outline = null)
{
    public string Hash { get; } = ContentHash.Of(Bytes);
}

/// <summary>What shall change. Nothing in it that differs from the head: no revision is made.</summary>
/// <param name="Parts">New and changed parts; new ones go last, in this order, unless <see cref="Order"/> says otherwise.</param>
public sealed record Change(IReadOnlyList<ProposedPart> Parts) : Proposal
{
    /// <summary>Ids of the projects that leave the document.</summary>
    public IReadOnlyList<string> Removed { get; init; } = [];

    /// <summary>All project ids that are left, in their new order; null keeps the order.</summary>
    public IReadOnlyList<string>? Order { get; init; }

    /// <summary>The whole document at once: parts of the head that are not in it are removed, and its order counts.</summary>
    public static Change Everything(Head? head, IReadOnlyList<ProposedPart> parts)
    {
        var kept = parts.Select(part => part.Project).ToHashSet(StringComparer.Ordinal);
        return new Change(parts)
        {
            Removed = head is null ? [] : [.. head.Parts.Select(part => part.Project).Where(project => !kept.Contains(project))],
            Order = [.. parts.Select(part => part.Project).Where(project => project != PartNames.Settings)],
        };
    }
}

/// <summary>The write is refused and nothing of it kept but an audit entry.</summary>
/// <param name="Reason">Handed back untouched in <see cref="WriteResult.Refusal"/>: faults, a failed precondition …</param>
public sealed record Refusal(object Reason) : Proposal;
