using System.Security.Cryptography;

namespace Portfolio.Store.Documents;

/// <summary>The name of a content: SHA-256 of its bytes in lower-case hex.</summary>
public static class ContentHash
{
    public static string Of(ReadOnlySpan<byte> bytes) => Convert.ToHexStringLower(SHA256.HashData(bytes));
}
