using System.Text;
using Dapper;
using Microsoft.Extensions.Time.Testing;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Deliveries;
using Portfolio.Store.Documents;
using Portfolio.Store.Idempotency;
using Portfolio.Store.Outbox;
using Portfolio.Store.Results;
using Portfolio.Store.Runs;
using Portfolio.Store.Samples;
using Portfolio.Store.Schedules;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Store.Tests.Testing;

/// <summary>A real database of its own, with a clock that stands until a test moves it.</summary>
public sealed class TestStore : IAsyncDisposable
{
    public static readonly DateTimeOffset Start = new(2026, 12, 1, 8, 0, 0, TimeSpan.Zero);

    private TestStore(TestPlace place) => Place = place;

    internal TestPlace Place { get; }
    public FakeTimeProvider Clock { get; } = new(Start);
    public Database Database { get; private set; } = null!;
    public KeyStore Keys => new(Database);
    public DocumentStore Documents => new(Database);
    public AuditStore Audit => new(Database);
    public OutboxStore Outbox => new(Database);
    public RunStore Runs => new(Database);
    public RunRequests Requests => new(Database);
    public RunClaims Claims => new(Database);
    public RunEndings Endings => new(Database);
    public SampleStore Samples => new(Database);
    public ResultStore Results => new(Database);
    public ScheduleStore Schedules => new(Database);
    public AnswerStore Answers => new(Database);
    public EventDistribution Distribution => new(Database);
    public SubscriptionStore Subscriptions => new(Database);
    public DeliveryStore Deliveries => new(Database);
    public DeliveryClaims DeliveryClaims => new(Database);
    public DeliveryEndings DeliveryEndings => new(Database);

    public static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    public static async Task<TestStore> OpenAsync(StoreKind kind)
    {
        var store = new TestStore(await TestPlace.MakeAsync(kind));
        await store.ReopenAsync();
        return store;
    }

    public async Task ReopenAsync()
    {
        if (Database is not null)
            await Database.DisposeAsync();
        Database = await Place.OpenAsync(Clock);
    }

    public async Task<Caller> CallerAsync(params Grant[] grants)
    {
        var made = await Keys.CreateAsync(Caller.System, "a key", grants, null, Cancellation);
        return (await Keys.AuthenticateAsync(made!.Secret, Cancellation))!;
    }

    /// <summary>Writes parts given as (project, text); the first write makes the portfolio.</summary>
    public Task<WriteResult> WriteAsync(string portfolio, params (string Project, string Text)[] parts) =>
        Documents.WriteAsync(
            Caller.System,
            new DocumentWrite { Portfolio = portfolio, Action = "document.put" },
            (_, _) => Task.FromResult<Proposal>(Parts(parts)),
            Cancellation);

    public static Change Parts(params (string Project, string Text)[] parts) =>
        new([.. parts.Select(part => new ProposedPart(part.Project, Encoding.UTF8.GetBytes(part.Text)))]);

    /// <summary>Statements on the database itself, past everything that the store guards.</summary>
    public async Task<T?> RawAsync<T>(string sql, object? parameters = null)
    {
        await using var connection = Place.Connect();
        return await connection.ExecuteScalarAsync<T>(sql, parameters);
    }

    public Task<long> CountAsync(string table) => RawAsync<long>($"select count(*) from {table}");

    public async ValueTask DisposeAsync()
    {
        await Database.DisposeAsync();
        await Place.DisposeAsync();
    }
}
