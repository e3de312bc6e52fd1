using System.Text.Json;
using System.Text.Json.Serialization;
using Portfolio.Server.Contracts.Keys;
using Portfolio.Server.Contracts.Events;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Contracts.Schedules;
using Portfolio.Server.Contracts.Subscriptions;

namespace Portfolio.Server.Contracts;

/// <summary>Generated writers and readers of everything on the wire but the portfolio document.</summary>
[JsonSourceGenerationOptions(
    JsonSerializerDefaults.Strict, PropertyNamingPolicy = JsonKnownNamingPolicy.CamelCase,
    DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull)]
[JsonSerializable(typeof(ProblemJson))]
[JsonSerializable(typeof(PageJson<PortfolioEntryJson>))]
[JsonSerializable(typeof(PortfolioEntryJson))]
[JsonSerializable(typeof(PageJson<RevisionJson>))]
[JsonSerializable(typeof(PageJson<ProjectEntryJson>))]
[JsonSerializable(typeof(PageJson<ChangeJson>))]
[JsonSerializable(typeof(WrittenJson))]
[JsonSerializable(typeof(UpdatedJson))]
[JsonSerializable(typeof(RunRequestJson))]
[JsonSerializable(typeof(RunJson))]
[JsonSerializable(typeof(PageJson<RunJson>))]
[JsonSerializable(typeof(RunProgressJson))]
[JsonSerializable(typeof(ScheduleJson))]
[JsonSerializable(typeof(ScheduleStandingJson))]
[JsonSerializable(typeof(KeyRequestJson))]
[JsonSerializable(typeof(RotationJson))]
[JsonSerializable(typeof(PageJson<KeyJson>))]
[JsonSerializable(typeof(PageJson<AuditEntryJson>))]
[JsonSerializable(typeof(PageJson<EventJson>))]
[JsonSerializable(typeof(SubscriptionRequestJson))]
[JsonSerializable(typeof(SecretRequestJson))]
[JsonSerializable(typeof(PageJson<SubscriptionJson>))]
[JsonSerializable(typeof(PageJson<DeliveryJson>))]
[JsonSerializable(typeof(IReadOnlyList<WantedEventJson>))]
internal sealed partial class ApiContext : JsonSerializerContext;
