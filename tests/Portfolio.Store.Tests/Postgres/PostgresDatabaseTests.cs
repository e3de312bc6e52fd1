using Microsoft.Extensions.Time.Testing;
using Npgsql;
using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Postgres;
using Portfolio.Store.Runs;
using Portfolio.Store.Sqlite;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Postgres;

public sealed class PostgresDatabaseTests
{
    [Fact]
    public void Both_databases_have_the_same_steps() => Assert.Equal(
        SqliteMigrations.All.Select(step => (step.Number, step.Name)), PostgresMigrations.All.Select(step => (step.Number, step.Name)));

    [Fact]
    public async Task An_older_database_is_brought_forward_and_keeps_what_it_has()
    {
        await using var place = await PostgresPlace.MakeAsync(PostgresTemplate.Empty);
        var clock = new FakeTimeProvider(TestStore.Start);
        await using (var old = await PostgresDatabase.OpenAsync(
            place.ConnectionString, clock, [.. PostgresMigrations.All.Take(2)], TestStore.Cancellation))
        {
            Assert.Equal(2, await old.MigrationLevelAsync(TestStore.Cancellation));
            await old.WriteAsync(
                open => open.ExecuteAsync("insert into portfolio (id, created_at) values ('works', 1)"), TestStore.Cancellation);
        }
        await using var now = await place.OpenAsync(clock);
        Assert.Equal(PostgresMigrations.All.Count, await now.MigrationLevelAsync(TestStore.Cancellation));
        Assert.Equal(1, await now.ReadAsync(open => open.FirstAsync<long>("select count(*) from portfolio"), TestStore.Cancellation));
    }

    [Fact]
    public async Task Processes_that_start_together_on_an_empty_database_migrate_it_once()
    {
        await using var place = await PostgresPlace.MakeAsync(PostgresTemplate.Empty);
        var opened = await Task.WhenAll(
            Enumerable.Range(0, 6).Select(_ => Task.Run(() => place.OpenAsync(new FakeTimeProvider(TestStore.Start)))));
        foreach (var database in opened)
        {
            Assert.Equal(PostgresMigrations.All.Count, await database.MigrationLevelAsync(TestStore.Cancellation));
            await database.DisposeAsync();
        }
    }

    [Fact]
    public async Task Writers_of_two_processes_take_turns_so_that_numbers_follow_each_other()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Postgres);
        await using var other = await store.Place.OpenAsync(store.Clock);
        await Task.WhenAll(Enumerable.Range(0, 40).Select(
            number => Task.Run(() => AppendAsync(number % 2 == 0 ? store.Database : other))));
        Assert.Equal(40, await store.RawAsync<long>("select max(sequence) from audit"));
        Assert.Null((await store.Audit.VerifyAsync(TestStore.Cancellation)).FirstBroken);
    }

    [Fact]
    public async Task Of_claims_by_two_processes_at_once_one_wins()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Postgres);
        await using var other = await store.Place.OpenAsync(store.Clock);
        await store.WriteAsync("works", ("", "s"));
        await store.QueueAsync(RunScenes.Asked(RunScenes.Today));
        var claims = await Task.WhenAll(Enumerable.Range(0, 12).Select(number => Task.Run(
            () => new RunClaims(number % 2 == 0 ? store.Database : other).ClaimAsync(
                Caller.System, $"process {number % 2}", RunScenes.Engine, RunScenes.Lease, TestStore.Cancellation))));
        Assert.Single(claims, claim => claim is not null);
    }

    [Theory]
    [InlineData("08006")]
    [InlineData("25006")]
    [InlineData("53100")]
    [InlineData("53300")]
    [InlineData("57P01")]
    [InlineData("58030")]
    public async Task A_server_that_refuses_a_write_is_told_and_asked_again_until_it_takes_one(string state)
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Postgres);
        store.Database.BeforeStatement = _ => throw new PostgresException("of the test", "ERROR", "ERROR", state);
        await store.Database.PingAsync(TestStore.Cancellation);
        await Assert.ThrowsAsync<StoreUnavailableException>(() => AppendAsync(store.Database));
        await Assert.ThrowsAsync<StoreUnavailableException>(() => store.Database.PingAsync(TestStore.Cancellation));
        store.Database.BeforeStatement = null;
        await store.Database.PingAsync(TestStore.Cancellation);
        Assert.Equal(0, await store.CountAsync("audit"));
        await AppendAsync(store.Database);
        Assert.Equal(1, await store.CountAsync("audit"));
    }

    [Fact]
    public async Task Connections_that_are_cut_are_told_and_made_again()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Postgres);
        await AppendAsync(store.Database);
        await PostgresPlace.OnServerAsync($"alter database {DatabaseOf(store)} allow_connections false");
        await PostgresPlace.OnServerAsync(
            $"select pg_terminate_backend(pid, 5000) from pg_stat_activity where datname = '{DatabaseOf(store)}'");
        await Assert.ThrowsAsync<StoreUnavailableException>(() => store.Database.PingAsync(TestStore.Cancellation));
        await Assert.ThrowsAsync<StoreUnavailableException>(() => AppendAsync(store.Database));
        await PostgresPlace.OnServerAsync($"alter database {DatabaseOf(store)} allow_connections true");
        await store.Database.PingAsync(TestStore.Cancellation);
        await AppendAsync(store.Database);
        Assert.Equal(2, await store.CountAsync("audit"));
    }

    [Fact]
    public async Task Idle_connections_that_died_unnoticed_are_made_again_and_nobody_is_told()
    {
        await using var store = await TestStore.OpenAsync(StoreKind.Postgres);
        await AppendAsync(store.Database);
        await store.Database.PingAsync(TestStore.Cancellation);
        await store.RawAsync<long>(PostgresPlace.CutSql);
        await AppendAsync(store.Database);
        await store.RawAsync<long>(PostgresPlace.CutSql);
        Assert.Equal(2, (await store.Audit.ListAsync(Caller.System, null, 10, TestStore.Cancellation)).Count);
    }

    [Fact]
    public async Task Writers_go_by_the_clock_of_the_server_unless_a_test_has_set_theirs()
    {
        await using var place = await PostgresPlace.MakeAsync();
        await using (var connection = (NpgsqlConnection)place.Connect())
        {
            await connection.OpenAsync(TestStore.Cancellation);
            await using var ahead = new NpgsqlCommand(
                $"""
                create function public.clock_timestamp() returns timestamptz language sql as
                  $$select pg_catalog.clock_timestamp() + interval '1 hour'$$;
                alter database {connection.Database} set search_path = public, pg_catalog;
                """,
                connection);
            await ahead.ExecuteNonQueryAsync(TestStore.Cancellation);
        }
#pragma warning disable RS0030 // What is tested is how the system's clock is left aside.
        var system = TimeProvider.System;
#pragma warning restore RS0030
        await using (var real = await place.OpenAsync(system))
        {
            await AppendAsync(real);
            Assert.InRange(await LastAsync(real) - system.GetUtcNow(), TimeSpan.FromMinutes(55), TimeSpan.FromMinutes(60));
        }
        await using var test = await place.OpenAsync(new FakeTimeProvider(TestStore.Start));
        await AppendAsync(test);
        Assert.Equal(TestStore.Start, await LastAsync(test));

        static Task<DateTimeOffset> LastAsync(Database database) => database.ReadAsync(
            async open => (await open.FirstAsync<long>("select at from audit order by sequence desc limit 1")).ToInstant(),
            TestStore.Cancellation);
    }

    [Fact]
    public async Task Where_all_connections_are_in_use_it_is_told_soon()
    {
        await using var place = await PostgresPlace.MakeAsync();
        await using var database = await PostgresDatabase.OpenAsync(
            $"{place.ConnectionString};Maximum Pool Size=2;Timeout=1", new FakeTimeProvider(TestStore.Start), TestStore.Cancellation);
        var release = new TaskCompletionSource();
        using var held = new CountdownEvent(2);
        var readers = Enumerable.Range(0, 2).Select(_ => database.ReadAsync(
            async open =>
            {
                held.Signal();
                await release.Task;
                return await open.FirstAsync<long>("select count(*) from audit");
            },
            TestStore.Cancellation)).ToArray();
        held.Wait(TestStore.Cancellation);
        await Assert.ThrowsAsync<StoreUnavailableException>(() => database.PingAsync(TestStore.Cancellation).WaitAsync(
            TimeSpan.FromSeconds(20), TestStore.Cancellation));
        release.SetResult();
        await Task.WhenAll(readers);
        await database.PingAsync(TestStore.Cancellation);
    }

    [Fact]
    public async Task A_server_that_is_not_there_is_told_in_a_sentence()
    {
        var told = await Assert.ThrowsAsync<StoreUnavailableException>(() => PostgresDatabase.OpenAsync(
            "Host=127.0.0.1;Port=1;Username=u;Password=secret;Database=d", new FakeTimeProvider(), TestStore.Cancellation));
        Assert.Contains("127.0.0.1:1", told.Message, StringComparison.Ordinal);
        Assert.DoesNotContain("secret", told.Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task Text_that_is_not_unicode_is_refused()
    {
        await using var place = await PostgresPlace.MakeAsync($"{PostgresTemplate.Empty} encoding 'SQL_ASCII' locale 'C'");
        var refused = await Assert.ThrowsAsync<StoreSchemaException>(() => place.OpenAsync(new FakeTimeProvider()));
        Assert.Contains("UTF8", refused.Message, StringComparison.Ordinal);
    }

    private static string DatabaseOf(TestStore store) => store.Place.Connect().Database;

    private static Task AppendAsync(Database database) =>
        new AuditStore(database).AppendAsync(Caller.System, "a", "b", new { }, TestStore.Cancellation);
}
