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
        if (match.Count > 0 && (current is null || !Names(match, current, strongly: true)))
            return Problem.PreconditionFailed();
        return noneMatch.Count > 0 && current is not null && Names(noneMatch, current, strongly: false)
            ? Problem.PreconditionFailed()
            : null;
    }

    /// <summary>For a read: true when the client has it already (304).</summary>
    public bool HasAlready(EntityTagHeaderValue current) => Names(noneMatch, current, strongly: false);

    private static bool Names(IList<EntityTagHeaderValue> tags, EntityTagHeaderValue current, bool strongly) =>
        tags.Any(tag => tag.Equals(EntityTagHeaderValue.Any) || tag.Compare(current, strongly));
}
