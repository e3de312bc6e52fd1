using Portfolio.Server.Webhooks;

namespace Portfolio.Server.Tests.Webhooks;

public sealed class RetryTimesTests
{
    private static readonly DateTimeOffset Now = new(2027, 1, 4, 12, 0, 0, TimeSpan.Zero);
    private static readonly DateTimeOffset Never = DateTimeOffset.MaxValue;
    private static readonly WebhookOptions Options = new();

    [Theory]
    [InlineData(1, 10)]
    [InlineData(2, 20)]
    [InlineData(3, 40)]
    [InlineData(9, 2560)]
    [InlineData(10, 3600)]
    [InlineData(1_000_000, 3600)]
    public void WaitsDoubleUpToTheLongestAndAreShortenedByAFifthAtMost(int attempt, double seconds)
    {
        for (var delivery = 0; delivery < 200; delivery++)
        {
            var wait = (RetryTimes.Next($"d{delivery}", attempt, Now, Never, Options)!.Value - Now).TotalSeconds;
            Assert.InRange(wait, 0.8 * seconds, seconds);
        }
    }

    [Fact]
    public void DeliveriesThatFailTogetherAreSpreadOut()
    {
        var waits = Enumerable.Range(0, 200).Select(d => (RetryTimes.Next($"d{d}", 10, Now, Never, Options)!.Value - Now).TotalSeconds).ToArray();
        Assert.InRange(waits.Min(), 2880, 2900);
        Assert.InRange(waits.Max(), 3580, 3600);
        Assert.InRange(waits.Average(), 3200, 3280);
    }

    [Fact]
    public void TheSameAttemptIsAlwaysMadeAtTheSameTime() =>
        Assert.Equal(RetryTimes.Next("d", 4, Now, Never, Options), RetryTimes.Next("d", 4, Now, Never, Options));

    [Fact]
    public void AfterItsTimeADeliveryIsGivenUp()
    {
        var (made, now, end) = (0, Now, Now.AddHours(24));
        for (DateTimeOffset? next = Now; next is not null; next = RetryTimes.Next("d", made, now, end, Options))
        {
            Assert.InRange(next.Value, Now, end);
            (now, made) = (next.Value, made + 1);
        }
        // Nine waits up to about 85 minutes together, then hourly ones.
        Assert.InRange(made, 31, 42);
    }

    [Theory]
    [InlineData(60, 60)]
    [InlineData(3, null)]
    [InlineData(-60, null)]
    [InlineData(90_000, 86_400)]
    public void AWishOfTheTargetCountsWhenItIsLaterAndEndsWithTheTimeForTrying(int wanted, int? expected)
    {
        var (own, end) = (RetryTimes.Next("d", 1, Now, Never, Options), Now.AddHours(24));
        var next = RetryTimes.Next("d", 1, Now, end, Options, Now.AddSeconds(wanted));
        Assert.Equal(expected is { } seconds ? Now.AddSeconds(seconds) : own, next);
        Assert.Null(RetryTimes.Next("d", 1, end, end, Options, end.AddSeconds(wanted)));
    }
}
