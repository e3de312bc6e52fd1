using System.Globalization;
using Portfolio.Server.Schedules;

namespace Portfolio.Server.Tests.Schedules;

public sealed class DueTimesTests
{
    // Clock changes by the IANA time zone database: Berlin 2027-03-28 02:00 to 03:00 and 2027-10-31 03:00 to 02:00; Lord Howe by half an
    // hour; Cairo and
    // Havana skip midnight; Apia left out 2011-12-30.
    [Theory]
    [InlineData("30 2 * * *", "UTC", "2027-03-28", "2027-03-28T02:30:00Z")]
    [InlineData("30 2 * * *", "Europe/Berlin", "2027-03-27", "2027-03-27T01:30:00Z")]
    [InlineData("30 2 * * *", "Europe/Berlin", "2027-03-28", "2027-03-28T01:00:00Z")]
    [InlineData("30 2 * * *", "Europe/Berlin", "2027-10-31", "2027-10-31T00:30:00Z")]
    [InlineData("*/20 2 * * *", "Europe/Berlin", "2027-10-31", "2027-10-31T00:00:00Z")]
    [InlineData("15 2 * * *", "Australia/Lord_Howe", "2027-10-03", "2027-10-02T15:30:00Z")]
    [InlineData("45 1 * * *", "Australia/Lord_Howe", "2027-04-04", "2027-04-03T14:45:00Z")]
    [InlineData("0 0 * * *", "Africa/Cairo", "2024-04-26", "2024-04-25T22:00:00Z")]
    [InlineData("0 0 * * *", "America/Havana", "2024-03-10", "2024-03-10T05:00:00Z")]
    [InlineData("0 4 * * *", "Pacific/Apia", "2011-12-30", null)]
    [InlineData("0 4 * * *", "Pacific/Apia", "2011-12-31", "2011-12-30T14:00:00Z")]
    [InlineData("0 6 29 2 *", "UTC", "2028-02-29", "2028-02-29T06:00:00Z")]
    [InlineData("0 6 29 2 *", "UTC", "2027-03-01", null)]
    [InlineData("0 22 * * fri", "UTC", "2027-01-01", "2027-01-01T22:00:00Z")]
    [InlineData("0 22 * * 5", "UTC", "2027-01-02", null)]
    public void ADateIsDueAtItsFirstTime(string cron, string zone, string date, string? due) =>
        Assert.Equal(due, Times(cron, zone).On(Date(date))?.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));

    [Theory]
    [InlineData("30 2 * * *", true)]
    [InlineData("  30  2 * *  mon-fri ", true)]
    [InlineData("0 30 2 * * *", false)]
    [InlineData("@daily", false)]
    [InlineData("61 2 * * *", false)]
    [InlineData("0 0 31 2 *", false)]
    [InlineData("", false)]
    public void OnlyFiveFieldsThatNameATimeAreRead(string text, bool read) => Assert.Equal(read, DueTimes.Parse(text) is not null);

    [Fact]
    public void TheNextDateAfterOneThatWasMadeIsALaterOne()
    {
        var times = Times("0 6 * * *", "UTC");
        Assert.Equal(Instant("2027-01-04T06:00Z"), times.Next(Instant("2027-01-04T05:00Z"), null));
        Assert.Equal(Instant("2027-01-05T06:00Z"), times.Next(Instant("2027-01-04T06:00Z"), null));
        Assert.Equal(Instant("2027-01-05T06:00Z"), times.Next(Instant("2027-01-04T05:00Z"), Date("2027-01-04")));
        Assert.Equal(Instant("2032-02-29T06:00Z"), Times("0 6 29 2 *", "UTC").Next(Instant("2028-02-29T06:00Z"), null));
    }

    private static DueTimes Times(string cron, string zone) => new(DueTimes.Parse(cron)!, TimeZoneInfo.FindSystemTimeZoneById(zone));

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static DateTimeOffset Instant(string text) => DateTimeOffset.Parse(text, CultureInfo.InvariantCulture);
}
