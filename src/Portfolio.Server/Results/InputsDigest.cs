using System.Globalization;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Server.Results;

/// <summary>SHA-256 over all that decides the figures of a run: engine version, seed, iterations, the document's parts in order.</summary>
public static class InputsDigest
{
    /// <summary>The digest in lower-case hexadecimal. One line of text for each input, so that it can be worked out by hand.</summary>
    public static string Of(RunFacts facts, string engineVersion)
    {
        var lines = new StringBuilder();
        lines.Append(CultureInfo.InvariantCulture, $"engine {engineVersion}\nseed {facts.Seed}\niterations {facts.Iterations}\n");
        foreach (var hash in facts.PartHashes) lines.Append(CultureInfo.InvariantCulture, $"part {hash}\n");
        if (facts.Overlay is { } overlay) lines.Append("overlay ").Append(Convert.ToHexStringLower(SHA256.HashData(overlay))).Append('\n');
        return Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(lines.ToString())));
    }
}
