using Portfolio.Store.Access;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Access;

public abstract class KeyStoreTests(StoreKind kind)
{
    public sealed class OnSqlite() : KeyStoreTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : KeyStoreTests(StoreKind.Postgres);

    private const string First = "a-first-key-of-more-than-thirty-two-characters";

    [Fact]
    public async Task The_first_administrator_is_made_once()
    {
        await using var store = await TestStore.OpenAsync(kind);
        Assert.False(await store.Keys.HasAdministratorAsync(TestStore.Cancellation));
        Assert.True(await store.Keys.BootstrapAsync(First, TestStore.Cancellation));
        Assert.False(await store.Keys.BootstrapAsync("another-key-of-more-than-thirty-two-characters", TestStore.Cancellation));
        Assert.True(await store.Keys.HasAdministratorAsync(TestStore.Cancellation));
        var caller = await store.Keys.AuthenticateAsync(First, TestStore.Cancellation);
        Assert.True(caller!.Holds(Right.Admin, Grant.Everywhere));
        Assert.Single(await store.Keys.ListAsync(caller, null, 9, TestStore.Cancellation));
    }

    [Fact]
    public async Task A_short_first_key_is_refused()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await Assert.ThrowsAsync<ArgumentException>(() => store.Keys.BootstrapAsync(First[..31], TestStore.Cancellation));
        Assert.False(await store.Keys.HasAdministratorAsync(TestStore.Cancellation));
    }

    [Fact]
    public async Task Grants_come_back_as_they_were_given()
    {
        await using var store = await TestStore.OpenAsync(kind);
        Grant[] grants = [new(Right.Read, "*"), new(Right.Submit, "works", ["lock", "quay"]), new(Right.Finance, "works")];
        var made = (await store.Keys.CreateAsync(Caller.System, "contractor", grants, null, TestStore.Cancellation))!;
        var found = (await store.Keys.FindAsync(Caller.System, made.Key.Id, TestStore.Cancellation))!;
        Assert.Equal("contractor", found.Name);
        Assert.Equivalent(grants, found.Grants, strict: true);
        Assert.Equivalent(grants, (await store.Keys.AuthenticateAsync(made.Secret, TestStore.Cancellation))!.Grants, strict: true);
        Assert.Equal(0, await store.RawAsync<long>(
            "select count(*) from api_key where secret_hash = @Secret or name = @Secret", new { made.Secret }));
    }

    [Fact]
    public async Task Unknown_expired_and_revoked_keys_are_nobody()
    {
        await using var store = await TestStore.OpenAsync(kind);
        Assert.Null(await store.Keys.AuthenticateAsync("pfk_nobody", TestStore.Cancellation));
        Assert.Null(await store.Keys.AuthenticateAsync("system", TestStore.Cancellation));
        var soon = store.Clock.GetUtcNow().AddHours(1);
        var expiring = (await store.Keys.CreateAsync(Caller.System, "soon", [new(Right.Admin, "*")], soon, TestStore.Cancellation))!;
        var revoked = (await store.Keys.CreateAsync(Caller.System, "gone", [new(Right.Read, "*")], null, TestStore.Cancellation))!;
        Assert.NotNull(await store.Keys.AuthenticateAsync(expiring.Secret, TestStore.Cancellation));
        var ended = await store.Keys.RevokeAsync(Caller.System, revoked.Key.Id, null, TestStore.Cancellation);
        Assert.Equal((KeyOutcome.Done, store.Clock.GetUtcNow()), (ended.Outcome, ended.Key!.RevokedAt));
        store.Clock.Advance(TimeSpan.FromMinutes(1));
        Assert.Equal(ended.Key!.RevokedAt, (await store.Keys.RevokeAsync(Caller.System, revoked.Key.Id, null, TestStore.Cancellation)).Key!.RevokedAt);
        Assert.Null(await store.Keys.AuthenticateAsync(revoked.Secret, TestStore.Cancellation));
        store.Clock.Advance(TimeSpan.FromHours(1));
        Assert.Null(await store.Keys.AuthenticateAsync(expiring.Secret, TestStore.Cancellation));
        Assert.False(await store.Keys.HasAdministratorAsync(TestStore.Cancellation));
    }

    [Fact]
    public async Task Only_administrators_of_everything_manage_keys_and_others_see_themselves()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var local = await store.CallerAsync(new Grant(Right.Admin, "works"));
        Assert.Null(await store.Keys.CreateAsync(local, "x", [], null, TestStore.Cancellation));
        Assert.Empty(await store.Keys.ListAsync(local, null, 9, TestStore.Cancellation));
        Assert.Equal(KeyOutcome.Forbidden, (await store.Keys.RevokeAsync(local, local.KeyId, null, TestStore.Cancellation)).Outcome);
        Assert.Equal(local.KeyId, (await store.Keys.FindAsync(local, local.KeyId, TestStore.Cancellation))!.Id);
        var other = await store.CallerAsync(new Grant(Right.Read, "works"));
        Assert.Null(await store.Keys.FindAsync(local, other.KeyId, TestStore.Cancellation));
    }

    [Fact]
    public async Task The_key_of_the_servers_own_jobs_is_nobodys_to_see_or_revoke()
    {
        await using var store = await TestStore.OpenAsync(kind);
        Assert.Null(await store.Keys.FindAsync(Caller.System, Caller.System.KeyId, TestStore.Cancellation));
        Assert.Equal(KeyOutcome.NotFound, (await store.Keys.RevokeAsync(Caller.System, Caller.System.KeyId, null, TestStore.Cancellation)).Outcome);
    }
}
