using Microsoft.Net.Http.Headers;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>What a request says about the state it expects (RFC 9110, section 13; RFC 6585 for 428).</summary>
internal sealed class Preconditions(HttpRequest request)
{
    private readonly IList<EntityTagHeaderValue> match = request.GetTypedHeaders().IfMatch;
    private readonly IList<EntityTagHeaderValue> noneMatch = request.GetTypedHeaders().IfNoneMatch;

    /// <summary>For a write that replaces everything at its address: null when it may go on.</summary>
    /// <param name="current">Tag of what is there; null when nothing is.</param>
    public Problem? OfReplacing(EntityTagHeaderValue? current)
    {
        if (OfChanging(current) is { } problem)
            return problem;
        return current is not null && match.Count == 0 ? Problem.PreconditionRequired() : null;
    }

    /// <summary>For a write that may come without conditions: null when it may go on.</summary>
    public Problem? OfChanging(EntityTagHeaderValue? current)
    {
        if ((Unread(HeaderNames.IfMatch) ?? Unread(HeaderNames.IfNoneMatch)) is { } unread)
            return unread;
        if (match.Count > 0 && (current is null || !Names(match, current, strongly: true)))
            return Problem.PreconditionFailed();
        return noneMatch.Count > 0 && current is not null && Names(noneMatch, current, strongly: false)
            ? Problem.PreconditionFailed()
            : null;
    }

    /// <summary>For a read: true when the client has it already (304).</summary>
    public bool HasAlready(EntityTagHeaderValue current) => Names(noneMatch, current, strongly: false);

    /// <summary>A condition that cannot be read is not met: without it a write would overwrite what it was to spare.</summary>
    private Problem? Unread(string header) =>
        request.Headers[header] is { Count: > 0 } sent && !EntityTagHeaderValue.TryParseStrictList(sent, out _)
            ? Problem.BadRequest($"'{header}' must be * or entity tags in double quotes, as ETag gives them.")
            : null;

    private static bool Names(IList<EntityTagHeaderValue> tags, EntityTagHeaderValue current, bool strongly) =>
        tags.Any(tag => tag.Equals(EntityTagHeaderValue.Any) || tag.Compare(current, strongly));
}
