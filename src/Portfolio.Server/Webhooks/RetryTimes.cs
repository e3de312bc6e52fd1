using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Server.Webhooks;

/// <summary>
/// When an attempt that failed is made again: waits double from the first to the longest, each shortened by up to a fifth, so that what
/// failed together is not tried together. The shortening is a function of delivery and attempt.
/// </summary>
internal static class RetryTimes
{
    private const double Spread = 0.2;

    /// <param name="attempt">The attempt that failed, from 1.</param>
    /// <param name="giveUpAt">No attempt is made after it.</param>
    /// <param name="wanted">Before it the target wants none; beyond the time for trying, the last one is made at its end.</param>
    /// <returns>Null when it is given up.</returns>
    public static DateTimeOffset? Next(
        string delivery, int attempt, DateTimeOffset now, DateTimeOffset giveUpAt, WebhookOptions options, DateTimeOffset? wanted = null)
    {
        var doubled = options.FirstRetrySeconds * Math.Pow(2, Math.Min(attempt - 1, 30));
        var seconds = Math.Min(doubled, options.LongestRetrySeconds) * (1 - Spread * Share(delivery, attempt));
        var next = now.AddSeconds(seconds);
        if (next > giveUpAt)
            return null;
        if (wanted is not { } later || later <= next)
            return next;
        return later <= giveUpAt ? later : giveUpAt;
    }

    // Evenly spread over 0…1.
    private static double Share(string delivery, int attempt)
    {
        var digest = SHA256.HashData(Encoding.UTF8.GetBytes($"{delivery}/{attempt}"));
        return BinaryPrimitives.ReadUInt32LittleEndian(digest) / (double)uint.MaxValue;
    }
}
