using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Documents.Parts;

/// <summary>A thing as a request would have it.</summary>
/// <param name="Content">With the id of its address.</param>
/// <param name="Faults">What was found wrong on the way.</param>
/// <param name="Place">From a pointer into the thing to one into what was sent; "" where it was not sent.</param>
internal sealed record PartContent<T>(T Content, IReadOnlyList<Fault> Faults, Func<string, string> Place);

/// <summary>The body of a request for one thing: whole, or a patch of what is there.</summary>
/// <param name="json">As it was sent.</param>
/// <param name="id">Id in the address; "" for settings, which have none.</param>
/// <param name="subject">What the thing is called in faults.</param>
internal abstract class PartBody<T>(ReadOnlyMemory<byte> json, PartType<T> type, string id, string subject)
{
    public ReadOnlyMemory<byte> Json => json;

    protected PartType<T> Type => type;

    protected string Subject => subject;

    /// <summary>True when there must be something to patch.</summary>
    public abstract bool NeedsStored { get; }

    /// <summary>The thing after this request.</summary>
    /// <param name="stored">Its canonical bytes; null when there is no such thing.</param>
    /// <exception cref="Contracts.Json.JsonRefused">Not JSON of the right shape; its path points into what was sent.</exception>
    public abstract PartContent<T> Over(byte[]? stored);

    /// <summary>The content with the id of the address; another one that was sent is a fault.</summary>
    protected T Addressed(T content, List<Fault> faults)
    {
        if (type.Id(content) is { } sent && sent != id)
            faults.Add(new Fault("/id", subject, FaultCodes.IdAddress, $"The address says {id}; leave the id out or give the same."));
        return type.WithId(content, id);
    }
}

/// <summary>Everything that shall stand at the address.</summary>
internal sealed class WholeBody<T>(ReadOnlyMemory<byte> json, DocumentReader reader, PartType<T> type, string id, string subject)
    : PartBody<T>(json, type, id, subject)
{
    private PartContent<T>? read;

    public override bool NeedsStored => false;

    // The same object each time: what was judged of it once stays good.
    public override PartContent<T> Over(byte[]? stored) => read ??= Read();

    private PartContent<T> Read()
    {
        var content = Type.Read(reader, Json);
        var faults = new List<Fault>();
        var withId = Type.Id(content) is not null;
        return new PartContent<T>(Addressed(content, faults), faults, path => path == "/id" && !withId ? "" : path);
    }
}
