using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.OpenApi;

/// <summary>What the types of the portfolio document leave open, because a missing or unreadable member is a fault among others.</summary>
internal static class DocumentMembers
{
    public static readonly IReadOnlyDictionary<Type, string[]> Required = new Dictionary<Type, string[]>
    {
        [typeof(DocumentJson)] = ["settings", "projects"],
        [typeof(SettingsJson)] = ["name", "currency"],
        [typeof(CalendarJson)] = ["id", "workingWeekdays"],
        [typeof(PoolJson)] = ["id", "capacity"],
        [typeof(CapacityChangeJson)] = ["from", "capacity"],
        [typeof(DriverJson)] = ["id"],
        [typeof(RankPairJson)] = ["between", "rank"],
        [typeof(UpdatesJson)] = ["updates"],
        [typeof(ProjectUpdateJson)] = ["project"],
        [typeof(ProjectJson)] = ["id", "statusDate"],
        [typeof(ActivityJson)] = ["id"],
        [typeof(DemandJson)] = ["pool", "units"],
        [typeof(RiskEventJson)] = ["id", "probability"],
        [typeof(ResponseJson)] = ["id"],
        [typeof(ChanceBranchesJson)] = ["id"],
        [typeof(BranchJson)] = ["id", "probability"],
    };

    public static readonly IReadOnlySet<string> Dates = new HashSet<string>(StringComparer.Ordinal)
    {
        "statusDate", "finish", "commitment", "earliestStart", "actualStart", "actualFinish", "from", "nonWorkingDates",
        "extraWorkingDates",
    };

    public static readonly IReadOnlyDictionary<string, IReadOnlyList<string>> Words = new Dictionary<string, IReadOnlyList<string>>
    {
        ["weekEnds"] = Contracts.Json.Words.Weekdays.All,
        ["workingWeekdays"] = Contracts.Json.Words.Weekdays.All,
        ["poolRule"] = Contracts.Json.Words.PoolRules.All,
        ["repair"] = Contracts.Json.Words.Repairs.All,
    };
}
