using Microsoft.Extensions.Options;
using Portfolio.Server.Hosting;
using Portfolio.Server.Problems;
using Portfolio.Store.Idempotency;

namespace Portfolio.Server.Idempotency;

/// <summary>
/// Around every write: an answer that is kept is given again; a second one waits while the first is at work; what was not accepted is not
/// remembered. A handler joins by handing <see cref="JoiningWrites.Remembers{T}(HttpContext, Func{HttpContext, T, IResult})"/> to its
/// store.
/// </summary>
internal sealed class OnceOnly(AnswerStore answers, WritesAtWork atWork, IOptions<LimitOptions> limits, TimeProvider clock)
    : IEndpointFilter
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(5);

    public async ValueTask<object?> InvokeAsync(EndpointFilterInvocationContext context, EndpointFilterDelegate next)
    {
        if (NamedWrite.Of(context.HttpContext) is not { } write)
            return await next(context);
        var begun = clock.GetTimestamp();
        do
        {
            if (await AgainAsync(write, context) is { } again)
                return again;
            if (atWork.TryEnter(write.Key))
                return await WorkAsync(write, context, next);
        }
        while (await atWork.EndsAsync(write.Key, Patience - clock.GetElapsedTime(begun), context.HttpContext.RequestAborted));
        context.HttpContext.Response.Headers.RetryAfter = "5";
        return Problem.Conflict(
            "idempotency-key-in-use", "The first request with this Idempotency-Key is still at work", "Ask again; its answer is kept.");
    }

    private async Task<object?> WorkAsync(NamedWrite write, EndpointFilterInvocationContext context, EndpointFilterDelegate next)
    {
        try
        {
            var answer = await next(context);
            if (write.KeptInPart)
                return answer;
            // Refused, perhaps only because another process has just done the same.
            return write.Kept is { } kept ? new GivenAnswer(kept, again: false) : await AgainAsync(write, context) ?? answer;
        }
        catch (Exception inVain) when (inVain is AnsweredAlreadyException or RequestRefused)
        {
            if (await AgainAsync(write, context) is { } again)
                return again;
            throw;
        }
        finally
        {
            atWork.Leave(write.Key);
        }
    }

    private async Task<IResult?> AgainAsync(NamedWrite write, EndpointFilterInvocationContext context) =>
        await answers.FindAsync(write.Key, context.HttpContext.RequestAborted) is { } first
            ? await write.AgainAsync(first, limits.Value.DocumentBody)
            : null;
}
