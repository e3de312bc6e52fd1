using System.Text.Json;
using System.Text.Json.Serialization.Metadata;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>Small JSON bodies, read so that whatever is wrong with them is said with its place.</summary>
internal static class JsonBody
{
    /// <summary>RFC 7396.</summary>
    public const string MergePatch = "application/merge-patch+json";

    private const int Depth = 16;

    /// <summary>The body; null when there is none.</summary>
    /// <exception cref="JsonRefused">Not JSON of the right shape (400).</exception>
    /// <exception cref="RequestRefused">Too large (413), or not JSON by its own account (415).</exception>
    public static async Task<T?> ReadAsync<T>(HttpRequest request, JsonTypeInfo<T> type, int limit)
        where T : class
    {
        using var body = await RequestBody.ReadAsync(request, limit);
        if (body.Bytes.IsEmpty)
            return null;
        if (!request.HasJsonContentType())
            throw new RequestRefused(MediaTypes.Unsupported(["application/json"]));
        return Read(body.Bytes.Span, type);
    }

    private static T Read<T>(ReadOnlySpan<byte> json, JsonTypeInfo<T> type)
        where T : class
    {
        try
        {
            return JsonSerializer.Deserialize(json, type) ?? throw JsonRefused.Null("");
        }
        catch (JsonException refused)
        {
            throw JsonRefused.From(json, refused, type, Depth);
        }
    }
}
