using System.Globalization;
using System.Text.Json;
using System.Text.Json.Serialization;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>What holds for the whole portfolio. Money is in its currency.</summary>
public sealed record SettingsJson
{
    internal static readonly SettingsJson Absent = new();

    public string? Name { get; init; }

    /// <summary>ISO 4217 code; fixed once a run or ledger entry exists.</summary>
    public string? Currency { get; init; }

    /// <summary>IANA zone of local dates of runs and of the schedule. Left out: UTC.</summary>
    public string? TimeZone { get; init; }

    /// <summary>Weekday on which the reporting week ends. Left out: sun.</summary>
    public string? WeekEnds { get; init; }

    /// <summary>Month and day, such as 04-01. Left out: 01-01.</summary>
    public string? FiscalYearStart { get; init; }

    /// <summary>Confidence levels to report, above 0 and below 100. Left out: 50, 80, 90.</summary>
    public IReadOnlyList<double>? Confidence { get; init; }

    /// <summary>Whole number 0…2⁵³−1. Left out: 1. A new seed starts a new comparison.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Seed { get; init; }

    /// <summary>Whole number. Left out: 10000.</summary>
    [JsonConverter(typeof(WholeNumberConverter))]
    public double? Iterations { get; init; }

    public PortfolioCommitmentsJson? Commitments { get; init; }

    public IReadOnlyList<CalendarJson>? Calendars { get; init; }

    /// <summary>Id of a calendar. Left out: every-day.</summary>
    public string? DefaultCalendar { get; init; }

    public IReadOnlyList<PoolJson>? Pools { get; init; }

    /// <summary>How pools are shared. Left out: passing.</summary>
    public string? PoolRule { get; init; }

    /// <summary>Reserved for price indices: refused until they are served.</summary>
    public JsonElement? Indices { get; init; }

    public IReadOnlyList<DriverJson>? Drivers { get; init; }

    public DependenceJson? Dependence { get; init; }

    /// <summary>Events of the whole portfolio; impacts name project/activity, or a project for a cost.</summary>
    public IReadOnlyList<RiskEventJson>? RiskEvents { get; init; }

    internal Settings ToModel(Reading reading, string path)
    {
        var place = new Place(path, "settings");
        reading.Reserved(place, "indices", Indices is { ValueKind: not JsonValueKind.Null });
        return new Settings
        {
            Name = reading.Required(place, "name", Name),
            Currency = reading.Required(place, "currency", Currency),
            TimeZone = TimeZone ?? "UTC",
            WeekEnds = reading.Word(place, "weekEnds", WeekEnds, Words.Weekdays) ?? DayOfWeek.Sunday,
            FiscalYearStart = DayOfYear(reading, place),
            Confidence = Confidence is null ? [50, 80, 90] : reading.Numbers(place, "confidence", Confidence),
            Seed = reading.Whole(place, "seed", Seed, -1, 1L << 53) ?? 1,
            Iterations = (int)(reading.Whole(place, "iterations", Iterations) ?? 10_000),
            Commitments = Commitments?.ToModel(reading, place.Under("commitments")),
            ProgrammeCommitments = Commitments?.ProgrammesToModel(reading, $"{path}/commitments/programmes")
                ?? new Dictionary<string, Commitments>(),
            Calendars = reading.List(place, "calendars", Calendars, (calendar, at) => calendar.ToModel(reading, at.Path)),
            DefaultCalendar = DefaultCalendar ?? WorkCalendar.EveryDayId,
            Pools = reading.List(place, "pools", Pools, (pool, at) => pool.ToModel(reading, at.Path)),
            PoolRule = reading.Word(place, "poolRule", PoolRule, Words.PoolRules) ?? Model.Documents.PoolRule.Passing,
            Drivers = reading.List(place, "drivers", Drivers, (driver, at) => driver.ToModel(reading, at.Path)),
            Dependence = Dependence?.ToModel(reading, $"{path}/dependence") ?? new Dependence(),
            RiskEvents = reading.List(place, "riskEvents", RiskEvents, (risk, at) => risk.ToModel(reading, at.Path, project: null)),
        };
    }

    private MonthDay DayOfYear(Reading reading, Place place)
    {
        if (FiscalYearStart is null)
            return new MonthDay(1, 1);
        // 2024 has a 29 February: that it is not a day of every year is for the rules to say.
        if (DateOnly.TryParseExact($"2024-{FiscalYearStart}", "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var day))
            return new MonthDay(day.Month, day.Day);
        reading.Refuse(place, "fiscalYearStart", FaultCodes.DateFormat, "'fiscalYearStart' is not a month and day of the form 04-01.");
        return new MonthDay(1, 1);
    }
}
