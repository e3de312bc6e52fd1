using Portfolio.Store.Idempotency;

namespace Portfolio.Store.Tests.Testing;

/// <summary>Answers of accepted writes.</summary>
internal static class AnswerScenes
{
    public static readonly KeptAnswer Answer = new(new string('b', 64), 201, "Location: /v1/x\n", [1, 2, 3]);

    public static WriteKey Key(string key = "once") => new("office", new string('a', 64), key);

    public static Task KeepAsync(StoreTransaction open) => AnswerStore.KeepAsync(open, Key(), Answer);
}
