using System.Buffers.Text;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Store.Access;

/// <summary>The text that a holder presents: a fixed beginning by which leaked keys are found, the key's id, 256 random bits.</summary>
public static class KeySecret
{
    public const int ShortestAllowed = 32;

    private const string Beginning = "pfk_";
    private const int IdLength = 16;

    public static string NewId() => Convert.ToHexStringLower(RandomNumberGenerator.GetBytes(IdLength / 2));

    public static string New(string id) => $"{Beginning}{id}_{Base64Url.EncodeToString(RandomNumberGenerator.GetBytes(32))}";

    /// <summary>The id that a text names; null when it is not of this form, as a first administrator's own text may be.</summary>
    internal static string? IdIn(string presented) =>
        presented.StartsWith(Beginning, StringComparison.Ordinal)
        && presented.Length > Beginning.Length + IdLength && presented[Beginning.Length + IdLength] == '_'
        && presented.AsSpan(Beginning.Length, IdLength) is var id && !id.ContainsAnyExcept("0123456789abcdef")
            ? id.ToString()
            : null;

    /// <summary>What is kept of it: a slow hash is for passwords, not for 256 random bits.</summary>
    internal static string HashOf(string secret) => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(secret)));

    /// <summary>Compares hashes in a time that does not tell where they differ.</summary>
    internal static bool Same(string? kept, string presented) => CryptographicOperations.FixedTimeEquals(
        Encoding.ASCII.GetBytes(kept ?? NobodysHash), Encoding.ASCII.GetBytes(presented));

    // No text has this hash: it holds no hexadecimal digit.
    private static readonly string NobodysHash = new('-', 64);
}
