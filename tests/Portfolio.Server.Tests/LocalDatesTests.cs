using Portfolio.Server.Http;

namespace Portfolio.Server.Tests;

/// <summary>
/// Transitions from the IANA time zone database: Sao Paulo skipped midnight on 2018-11-04, Havana repeated it on 2021-11-07.
/// </summary>
public sealed class LocalDatesTests
{
    [Theory]
    [InlineData("UTC", "2027-01-04", "2027-01-04T00:00:00Z")]
    [InlineData("Europe/Berlin", "2027-03-28", "2027-03-27T23:00:00Z")]
    [InlineData("Europe/Berlin", "2027-03-29", "2027-03-28T22:00:00Z")]
    [InlineData("America/Sao_Paulo", "2018-11-04", "2018-11-04T03:00:00Z")]
    [InlineData("America/Havana", "2021-11-07", "2021-11-07T04:00:00Z")]
    public void ADateBeginsAtItsFirstInstant(string zone, string date, string instant)
    {
        var local = TimeZoneInfo.FindSystemTimeZoneById(zone);
        var day = DateOnly.Parse(date, System.Globalization.CultureInfo.InvariantCulture);
        var start = LocalDates.StartOf(day, local);
        Assert.Equal(DateTimeOffset.Parse(instant, System.Globalization.CultureInfo.InvariantCulture), start);
        Assert.Equal(day, LocalDates.Of(start, local));
        Assert.Equal(day.AddDays(-1), LocalDates.Of(start.AddTicks(-1), local));
        Assert.Equal(start, LocalDates.EndOf(day.AddDays(-1), local).AddTicks(1));
    }
}
