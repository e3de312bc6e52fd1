namespace Portfolio.Model.Documents;

/// <summary>What holds for the whole portfolio. Money is in <see cref="Currency"/>.</summary>
public sealed record Settings
{
    public required string Name { get; init; }

    /// <summary>ISO 4217 code; its minor unit is that of all money in the portfolio.</summary>
    public required string Currency { get; init; }

    /// <summary>IANA zone of local dates.</summary>
    public string TimeZone { get; init; } = "UTC";

    public DayOfWeek WeekEnds { get; init; } = DayOfWeek.Sunday;

    public MonthDay FiscalYearStart { get; init; } = new(1, 1);

    /// <summary>Confidence levels to report, each above 0 and below 100.</summary>
    public IReadOnlyList<double> Confidence { get; init; } = [50, 80, 90];

    /// <summary>0…2⁵³−1.</summary>
    public long Seed { get; init; } = 1;

    public int Iterations { get; init; } = 10_000;

    public Commitments? Commitments { get; init; }

    /// <summary>Commitments by programme id.</summary>
    public IReadOnlyDictionary<string, Commitments> ProgrammeCommitments { get; init; } = new Dictionary<string, Commitments>();

    /// <summary>As stated; <see cref="WorkCalendar.EveryDay"/> exists beside them.</summary>
    public IReadOnlyList<WorkCalendar> Calendars { get; init; } = [];

    public string DefaultCalendar { get; init; } = WorkCalendar.EveryDayId;

    public IReadOnlyList<Pool> Pools { get; init; } = [];

    public PoolRule PoolRule { get; init; }

    public IReadOnlyList<Driver> Drivers { get; init; } = [];

    public Dependence Dependence { get; init; } = new();

    public IReadOnlyList<RiskEvent> RiskEvents { get; init; } = [];
}

/// <summary>Day of a year, such as the start of the fiscal year.</summary>
public readonly record struct MonthDay(int Month, int Day);

/// <summary>What was promised; money in the portfolio's currency.</summary>
public sealed record Commitments(DateOnly? Finish, decimal? Budget);
