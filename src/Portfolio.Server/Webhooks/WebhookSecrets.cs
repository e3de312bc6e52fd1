using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Webhooks;

/// <summary>Secrets and signatures as the Standard Webhooks specification 1.0.0 writes them.</summary>
internal static class WebhookSecrets
{
    private const string Prefix = "whsec_";

    // The specification asks for 24 to 64.
    private const int Bytes = 32;

    /// <summary>A new secret: the prefix and 256 random bits in base64.</summary>
    public static string New() => Prefix + Convert.ToBase64String(RandomNumberGenerator.GetBytes(Bytes));

    /// <summary>The value of <c>webhook-signature</c>: one signature, or two while a secret is being replaced.</summary>
    public static string Sign(SigningSecrets secrets, string id, long timestamp, ReadOnlySpan<byte> body)
    {
        var present = Sign(secrets.Present, id, timestamp, body);
        return secrets.Previous is { } previous ? $"{present} {Sign(previous, id, timestamp, body)}" : present;
    }

    private static string Sign(string secret, string id, long timestamp, ReadOnlySpan<byte> body)
    {
        using var digest = IncrementalHash.CreateHMAC(HashAlgorithmName.SHA256, Convert.FromBase64String(secret[Prefix.Length..]));
        digest.AppendData(Encoding.UTF8.GetBytes(string.Create(CultureInfo.InvariantCulture, $"{id}.{timestamp}.")));
        digest.AppendData(body);
        return "v1," + Convert.ToBase64String(digest.GetHashAndReset());
    }
}
