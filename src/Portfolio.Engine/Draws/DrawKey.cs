using System.IO.Hashing;
using System.Text;

namespace Portfolio.Engine.Draws;

/// <summary>
/// Names of draws, such as <c>project/weir-lock/activity/A10/duration</c>, and their 64-bit hashes. A draw depends on its name, the seed
/// and the iteration alone, so whatever keeps its name keeps its draws.
/// </summary>
internal static class DrawKey
{
    /// <summary>Common factor of all projects.</summary>
    public const string Portfolio = "portfolio";

    public static string Programme(string id) => "programme/" + id;

    public static string Driver(string id) => "driver/" + id;

    public static string Project(string id) => "project/" + id;

    /// <summary>XXH3 (64 bits, seed 0) of the key's UTF-8. A change of this function changes every draw.</summary>
    public static ulong Hash(string key)
    {
        Span<byte> bytes = stackalloc byte[Encoding.UTF8.GetMaxByteCount(key.Length)];
        return XxHash3.HashToUInt64(bytes[..Encoding.UTF8.GetBytes(key, bytes)]);
    }
}
