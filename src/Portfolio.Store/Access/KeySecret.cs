using System.Buffers.Text;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Store.Access;

/// <summary>The text that a holder presents: a fixed beginning by which leaked keys are found, the key's id, 256 random bits.</summary>
internal static class KeySecret
{
    public const int ShortestAllowed = 32;

    public static string NewId() => Convert.ToHexStringLower(RandomNumberGenerator.GetBytes(8));

    public static string New(string id) => $"pfk_{id}_{Base64Url.EncodeToString(RandomNumberGenerator.GetBytes(32))}";

    /// <summary>What is kept of it and looked up by. An index lookup by the hash gives away nothing about the text in time.</summary>
    public static string HashOf(string secret) => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(secret)));
}
