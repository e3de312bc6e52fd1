using System.Security.Cryptography;
using System.Text;
using Microsoft.AspNetCore.Http.Metadata;
using Portfolio.Server.Access;
using Portfolio.Server.Problems;
using Portfolio.Store;
using Portfolio.Store.Idempotency;

namespace Portfolio.Server.Idempotency;

/// <summary>
/// A write that came with <c>Idempotency-Key</c>: it has its effect once, and whoever sends it again gets the first answer.
/// </summary>
internal sealed class NamedWrite
{
    public const string Header = "Idempotency-Key";

    private const int LongestKey = 255;

    private readonly HttpContext http;
    private readonly WriteBody body;

    private NamedWrite(HttpContext http, WriteKey key)
    {
        (this.http, Key, body) = (http, key, new WriteBody(http.Request));
        http.Request.Body = body;
        http.Response.RegisterForDispose(body);
        http.Features.Set(this);
    }

    public WriteKey Key { get; }

    /// <summary>The answer that was kept with the effect; null as long as there is none.</summary>
    public KeptAnswer? Kept { get; private set; }

    /// <summary>True when the first answer says more than what was kept of it: then it is the handler's own that is given first.</summary>
    public bool KeptInPart { get; private set; }

    /// <summary>Null for a read, and for a write without the header.</summary>
    /// <exception cref="RequestRefused">The header is no key (400).</exception>
    public static NamedWrite? Of(HttpContext http)
    {
        var request = http.Request;
        if (HttpMethods.IsGet(request.Method) || request.Headers[Header] is not { Count: > 0 } sent)
            return null;
        if (sent is not [{ Length: >= 1 and <= LongestKey } key] || key.Any(letter => letter is < ' ' or > '~'))
        {
            throw new RequestRefused(new Problem(
                400, "idempotency-key-invalid", "The Idempotency-Key cannot be used",
                $"Send one key of 1 to {LongestKey} printable ASCII characters."));
        }
        var address = $"{request.Method} {request.PathBase}{request.Path}{request.QueryString}";
        var digest = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(address)));
        return new NamedWrite(http, new WriteKey(http.User.Caller().KeyId, digest, key));
    }

    /// <summary>Keeps the answer in the transaction of its effect.</summary>
    public async Task KeepAsync(StoreTransaction open, Func<HttpContext, Task<IResult>> answer)
    {
        var made = await GivenAnswer.MakeAsync(http, body.Digest, answer);
        await AnswerStore.KeepAsync(open, Key, made);
        Kept = made;
    }

    /// <summary>Keeps the answer without a secret that only the first one may show.</summary>
    public async Task KeepInPartAsync(StoreTransaction open, Func<HttpContext, Task<IResult>> answer)
    {
        await KeepAsync(open, answer);
        KeptInPart = true;
    }

    /// <summary>The first answer for an equal request, a refusal for another.</summary>
    public async Task<IResult> AgainAsync(KeptAnswer first, long mostBytes)
    {
        if (http.GetEndpoint()?.Metadata.GetMetadata<IAcceptsMetadata>() is not null)
            await ReadOutAsync(mostBytes);
        return body.Digest == first.Request ? new GivenAnswer(first, again: true) : Reused();
    }

    private async Task ReadOutAsync(long mostBytes)
    {
        var (buffer, left) = (new byte[64 * 1024], mostBytes);
        for (int read; (read = await body.ReadAsync(buffer, http.RequestAborted)) > 0;)
            if ((left -= read) < 0)
                throw new RequestRefused(Problem.TooLarge((int)mostBytes));
    }

    private static Problem Reused() => new(
        422, "idempotency-key-reused", "The Idempotency-Key stands for another request",
        "It was sent here before with another body or other conditions. Use a new key for a new request.");
}

/// <summary>How a write joins.</summary>
internal static class JoiningWrites
{
    /// <summary>
    /// What a store is handed to keep the answer in the transaction of its effect; null when the request came without a key of its own.
    /// </summary>
    /// <param name="answer">Makes the answer from what the store will return; it may set headers of the context that it is given.</param>
    public static Func<StoreTransaction, T, CancellationToken, Task>? Remembers<T>(
        this HttpContext http, Func<HttpContext, T, Task<IResult>> answer) =>
        http.Features.Get<NamedWrite>() is { } write ? (open, result, _) => write.KeepAsync(open, to => answer(to, result)) : null;

    /// <inheritdoc cref="Remembers{T}(HttpContext, Func{HttpContext, T, Task{IResult}})"/>
    public static Func<StoreTransaction, T, CancellationToken, Task>? Remembers<T>(
        this HttpContext http, Func<HttpContext, T, IResult> answer) =>
        http.Remembers<T>((to, result) => Task.FromResult(answer(to, result)));

    /// <summary>The same for an answer whose first giving shows a secret, which is kept nowhere.</summary>
    /// <param name="answer">Makes the answer without it.</param>
    public static Func<StoreTransaction, T, CancellationToken, Task>? RemembersWithoutSecret<T>(
        this HttpContext http, Func<HttpContext, T, IResult> answer) =>
        http.Features.Get<NamedWrite>() is { } write
            ? (open, result, _) => write.KeepInPartAsync(open, to => Task.FromResult(answer(to, result)))
            : null;
}
