using Microsoft.Extensions.Caching.Memory;
using Portfolio.Model.Documents;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Documents;

/// <summary>Stored settings as the rules want them.</summary>
internal sealed record KnownSettings(Settings Settings, PortfolioContext Context);

/// <summary>
/// What was made lately of stored contents, by content hash: contents never change, so what is kept here is never stale. Bounded; what was
/// dropped is made again.
/// </summary>
internal sealed class KnownParts(ModelLimits limits) : IDisposable
{
    // Some millions of activities; a whole portfolio of the usual size takes a twentieth.
    private const long Room = 128L * 1024 * 1024;
    private const int RoomOfPart = 1024;
    private const int RoomOfActivity = 100;
    // Read settings take several times the room of their JSON.
    private const int RoomOfByte = 8;

    private readonly MemoryCache kept = new(new MemoryCacheOptions { SizeLimit = Room });

    public ProjectOutline? Outline(string hash) => kept.Get<ProjectOutline>(hash);

    public void Keep(string hash, ProjectOutline outline) =>
        kept.Set(hash, outline, Sized(RoomOfPart + ((long)RoomOfActivity * outline.ActivityIds.Count)));

    public KnownSettings? Settings(string hash) => kept.Get<KnownSettings>(hash);

    public KnownSettings Keep(string hash, byte[] settings)
    {
        var model = DocumentReader.OfStored.ReadSettings(settings).ToModel(new Reading(), "/settings");
        return kept.Set(hash, new KnownSettings(model, PortfolioContext.Of(model, limits)), Sized((long)RoomOfByte * settings.Length));
    }

    public void Dispose() => kept.Dispose();

    private static MemoryCacheEntryOptions Sized(long size) => new() { Size = size };
}
