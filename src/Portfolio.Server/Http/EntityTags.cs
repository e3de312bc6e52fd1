using System.Security.Cryptography;
using System.Text;
using Microsoft.Net.Http.Headers;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Http;

/// <summary>Strong entity tags (RFC 9110, section 8.8): digests of the content alone, the same for every key that sees the same.</summary>
internal static class EntityTags
{
    /// <summary>Of one part: its content hash.</summary>
    public static EntityTagHeaderValue OfPart(string hash) => new($"\"{hash}\"");

    /// <summary>Of an answer that these words determine.</summary>
    public static EntityTagHeaderValue OfText(string text) =>
        OfPart(Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text))));

    /// <summary>Of a document: a digest over the ids and hashes of its parts in order.</summary>
    public static EntityTagHeaderValue OfDocument(IEnumerable<PartHead> parts)
    {
        using var digest = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var part in parts)
            digest.AppendData(Encoding.UTF8.GetBytes($"{part.Project}\n{part.Hash}\n"));
        return OfPart(Convert.ToHexStringLower(digest.GetHashAndReset()));
    }
}
