using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Idempotency;
using Portfolio.Store.Tests.Testing;

namespace Portfolio.Store.Tests.Idempotency;

public abstract class AnswerStoreTests(StoreKind kind)
{
    public sealed class OnSqlite() : AnswerStoreTests(StoreKind.Sqlite);

    public sealed class OnPostgres() : AnswerStoreTests(StoreKind.Postgres);

    [Fact]
    public async Task An_answer_is_kept_with_its_effect_and_found_by_the_whole_key()
    {
        await using var store = await TestStore.OpenAsync(kind);
        Assert.Null(await FindAsync(store, AnswerScenes.Key()));
        await WriteAsync(store, "a", AnswerScenes.KeepAsync);
        var found = (await FindAsync(store, AnswerScenes.Key()))!;
        Assert.Equal(AnswerScenes.Answer with { Body = [] }, found with { Body = [] }, (x, y) => x!.ToString() == y!.ToString());
        Assert.Equal([1, 2, 3], found.Body);
        foreach (var other in new[]
        {
            AnswerScenes.Key("Once"), AnswerScenes.Key() with { Caller = "other" }, AnswerScenes.Key() with { Address = new string('c', 64) },
        })
            Assert.Null(await FindAsync(store, other));
    }

    [Fact]
    public async Task A_second_answer_takes_its_effect_with_it()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await WriteAsync(store, "a", AnswerScenes.KeepAsync);
        await Assert.ThrowsAsync<AnsweredAlreadyException>(() => WriteAsync(
            store, "b", open => AnswerStore.KeepAsync(open, AnswerScenes.Key(), AnswerScenes.Answer with { Status = 200 })));
        Assert.Equal(1, await store.CountAsync("revision"));
        Assert.Equal(201, (await FindAsync(store, AnswerScenes.Key()))!.Status);
    }

    /// <summary>Two processes on one database: whoever comes second finds the row, whatever its own memory says.</summary>
    [Fact]
    public async Task Of_many_at_once_one_has_its_effect()
    {
        await using var store = await TestStore.OpenAsync(kind);
        var outcomes = await Task.WhenAll(Enumerable.Range(0, 20).Select(async i =>
        {
            try
            {
                await WriteAsync(store, $"{i}", AnswerScenes.KeepAsync);
                return true;
            }
            catch (AnsweredAlreadyException)
            {
                return false;
            }
        }));
        Assert.Single(outcomes, true);
        Assert.Equal(1, await store.CountAsync("revision"));
    }

    [Fact]
    public async Task After_48_hours_it_is_forgotten_and_its_key_free()
    {
        await using var store = await TestStore.OpenAsync(kind);
        await WriteAsync(store, "a", AnswerScenes.KeepAsync);
        store.Clock.Advance(TimeSpan.FromHours(48) - TimeSpan.FromSeconds(1));
        Assert.Equal(0, await store.Answers.ForgetAsync(TestStore.Cancellation));
        Assert.NotNull(await FindAsync(store, AnswerScenes.Key()));
        store.Clock.Advance(TimeSpan.FromSeconds(1));
        Assert.Null(await FindAsync(store, AnswerScenes.Key()));
        await WriteAsync(store, "b", AnswerScenes.KeepAsync);
        Assert.NotNull(await FindAsync(store, AnswerScenes.Key()));
        store.Clock.Advance(TimeSpan.FromHours(48));
        Assert.Equal(1, await store.Answers.ForgetAsync(TestStore.Cancellation));
        Assert.Equal(0, await store.CountAsync("kept_answer"));
    }

    private static Task<KeptAnswer?> FindAsync(TestStore store, WriteKey key) => store.Answers.FindAsync(key, TestStore.Cancellation);

    private static Task<WriteResult> WriteAsync(TestStore store, string content, Func<StoreTransaction, Task> joining) =>
        store.Documents.WriteAsync(
            Caller.System,
            new DocumentWrite { Portfolio = "works", Action = "document.put", Joining = (open, _, _) => joining(open) },
            (_, _) => Task.FromResult<Proposal>(TestStore.Parts(("", content))), TestStore.Cancellation);
}
