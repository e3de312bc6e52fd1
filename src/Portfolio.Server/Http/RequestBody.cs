using System.Buffers;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>A request's body in a rented buffer; give it back by disposing. The bytes are gone then.</summary>
internal sealed class RequestBody : IDisposable
{
    private const int FirstRent = 64 * 1024;

    private byte[] buffer = [];
    private int length;

    private RequestBody()
    {
    }

    public ReadOnlyMemory<byte> Bytes => buffer.AsMemory(0, length);

    /// <exception cref="RequestRefused">The body is larger than <paramref name="limit"/> bytes (413) or encoded (415).</exception>
    public static async Task<RequestBody> ReadAsync(HttpRequest request, int limit)
    {
        if (request.Headers.ContentEncoding.Count > 0 && request.Headers.ContentEncoding != "identity")
            throw new RequestRefused(new Problem(415, "unsupported-encoding", "Encoded bodies are not taken"));
        if (request.ContentLength > limit)
            throw new RequestRefused(Problem.TooLarge(limit));
        var body = new RequestBody();
        try
        {
            await body.FillAsync(request, limit);
            return body;
        }
        catch
        {
            body.Dispose();
            throw;
        }
    }

    private async Task FillAsync(HttpRequest request, int limit)
    {
        buffer = ArrayPool<byte>.Shared.Rent((int)Math.Min(limit, (request.ContentLength ?? FirstRent) + 1));
        var cancellation = request.HttpContext.RequestAborted;
        for (int read; (read = await request.Body.ReadAsync(buffer.AsMemory(length), cancellation)) > 0;)
        {
            length += read;
            if (length > limit)
                throw new RequestRefused(Problem.TooLarge(limit));
            if (length == buffer.Length)
                Grow();
        }
    }

    private void Grow()
    {
        var larger = ArrayPool<byte>.Shared.Rent(2 * buffer.Length);
        Bytes.CopyTo(larger);
        ArrayPool<byte>.Shared.Return(buffer);
        buffer = larger;
    }

    public void Dispose()
    {
        if (buffer.Length > 0)
            ArrayPool<byte>.Shared.Return(buffer);
        buffer = [];
        length = 0;
    }
}
