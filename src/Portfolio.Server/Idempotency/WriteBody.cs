using System.Security.Cryptography;
using System.Text;
using Microsoft.Net.Http.Headers;

namespace Portfolio.Server.Idempotency;

/// <summary>
/// A request's body that takes the digest of what is read from it, so that nothing is read twice. What the sender says of the body and of
/// what it replaces counts too.
/// </summary>
internal sealed class WriteBody : Stream
{
    private readonly Stream body;
    private readonly IncrementalHash digest = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);

    public WriteBody(HttpRequest request)
    {
        body = request.Body;
        foreach (var name in new[] { HeaderNames.ContentType, HeaderNames.IfMatch, HeaderNames.IfNoneMatch })
            digest.AppendData(Encoding.UTF8.GetBytes($"{name}: {request.Headers[name]}\n"));
    }

    /// <summary>Of everything read so far, lower-case hex.</summary>
    public string Digest => Convert.ToHexStringLower(digest.GetCurrentHash());

    public override async ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default)
    {
        var read = await body.ReadAsync(buffer, cancellationToken);
        digest.AppendData(buffer.Span[..read]);
        return read;
    }

    public override Task<int> ReadAsync(byte[] buffer, int offset, int count, CancellationToken cancellationToken) =>
        ReadAsync(buffer.AsMemory(offset, count), cancellationToken).AsTask();

    protected override void Dispose(bool disposing)
    {
        if (disposing)
            digest.Dispose();
        base.Dispose(disposing);
    }

    public override bool CanRead => true;

    public override bool CanSeek => false;

    public override bool CanWrite => false;

    public override long Length => throw new NotSupportedException();

    public override long Position
    {
        get => throw new NotSupportedException();
        set => throw new NotSupportedException();
    }

    public override void Flush()
    {
    }

    public override int Read(byte[] buffer, int offset, int count) => throw new NotSupportedException("Bodies are read asynchronously.");

    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();
}
