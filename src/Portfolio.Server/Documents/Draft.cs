using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Documents;

/// <summary>A part as a write would have it, shape not yet judged.</summary>
/// <param name="Content">With its id.</param>
/// <param name="Place">
/// From a pointer into the part to the pointer into the JSON that was sent; "" where that member was not sent but is stored.
/// </param>
internal sealed record PartDraft<T>(T Content, Func<string, string> Place)
{
    /// <summary>Places of the activities that were sent where the rest of the project is stored; null: the whole was sent.</summary>
    public IReadOnlySet<int>? SentActivities { get; init; }
}

/// <summary>What a write would make of some parts of the document, before it is checked; or why it is refused at once.</summary>
internal sealed record Draft
{
    /// <summary>Set: nothing else counts.</summary>
    public Problem? Refusal { get; private init; }

    /// <summary>Null: they stay.</summary>
    public PartDraft<SettingsJson>? Settings { get; init; }

    /// <summary>New and changed projects; new ones go last, in this order.</summary>
    public IReadOnlyList<PartDraft<ProjectJson>> Projects { get; init; } = [];

    /// <summary>Projects that leave the document.</summary>
    public IReadOnlyList<string> Removed { get; init; } = [];

    /// <summary>What whoever drew it up found wrong; paths point into the JSON that was sent.</summary>
    public IReadOnlyList<Fault> Faults { get; init; } = [];

    /// <summary>The JSON that was sent, to put faults in its order; empty for none.</summary>
    public ReadOnlyMemory<byte> Sent { get; init; }

    /// <summary>True when the thing at the address was not there before.</summary>
    public bool Creates { get; init; }

    /// <summary>True when the thing at the address is there no longer.</summary>
    public bool Removes { get; init; }

    /// <summary>The activity at the address; null when the address is that of a whole part.</summary>
    public ActivityJson? Activity { get; init; }

    /// <summary>True when the address stands for the whole document.</summary>
    public bool OfWhole { get; init; }

    /// <summary>How faults are told; null: by pointers into the JSON that was sent.</summary>
    public Func<IReadOnlyList<Fault>, Problem>? Refused { get; init; }

    public static implicit operator Draft(Problem refusal) => new() { Refusal = refusal };
}
