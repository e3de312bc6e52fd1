namespace Portfolio.Server.Problems;

/// <summary>Every kind of problem, by status; a kind that is answered and not listed here fails a test.</summary>
internal static class ProblemKinds
{
    /// <summary>The kind whose page lists the codes of faults.</summary>
    public const string Refused = "refused";

    /// <summary>The kind of what the framework refuses by itself with a status that has no kind of its own.</summary>
    public const string Other = "other";

    public static IReadOnlyList<ProblemKind> All { get; } =
    [
        new("bad-request", 400, "A parameter of the address or a header cannot be read.", "Correct the request; 'detail' says what is wrong."),
        new("malformed", 400, "The body is not JSON (or CSV) of the right shape; reading stopped at the first wrong place.",
            "'errors' names that place with line and column; correct it and send the request again."),
        new("idempotency-key-invalid", 400, "The Idempotency-Key is empty, too long, or there is more than one.",
            "Send one key of printable ASCII characters, or none."),
        new("unauthorized", 401, "The request came without a key or token that is valid.",
            "Present a key as bearer or as the password of Basic; perhaps yours has been replaced, revoked or has expired."),
        new("forbidden", 403, "The key has a grant on this portfolio, but not the right for this, or not for every member that was sent.",
            "Ask an administrator for the right; where 'errors' names members, leave them out."),
        new("other-site", 403, "A page of another site made the browser send this write, with a key that the browser remembers.",
            "Send it from a program, or from a page of this server."),
        new("not-found", 404, "There is no such thing, or the key has no grant on the portfolio that holds it.",
            "Check the address, and with GET /v1/keys/self what the key may see."),
        new("method-not-allowed", 405, "This address does not serve the method.", "The header Allow names the methods that are served."),
        new("not-acceptable", 406, "The answer exists in none of the media types that the request accepts.",
            "Widen the header Accept, or leave it out."),
        new("too-slow", 408, "The body came in too slowly and was given up.", "Send it again over a faster connection."),
        new("archived", 409, "The portfolio is archived: it can be read, but no longer written or run.", "Use another portfolio."),
        new("date-closed", 409, "The date has ended and a recorded run stands, or will stand, for it.",
            "To put another run in its place, name the one that stands in 'replaces'."),
        new("delivery-under-way", 409, "The delivery is being sent at this moment.", "Look at it again in a moment."),
        new("exists", 409, "There is one with this id already.", "PUT replaces what is there; another id makes another."),
        new("idempotency-key-in-use", 409, "The first request with this Idempotency-Key is still at work.",
            "Send the same request again after the time in Retry-After; its answer is kept."),
        new("key-ended", 409, "The key has been revoked or has expired and cannot be changed.", "Make a new key."),
        new("key-of-person", 409, "The entry is a person who came with a token; their rights stand in the tokens.",
            "Change the rights at the issuer; DELETE shuts the person out."),
        new("last-administrator", 409, "Without this key nobody could make keys.",
            "First make another key with 'admin' on '*' that does not expire."),
        new("not-the-point", 409, "The run named in 'replaces' does not stand for its date.", "Name the run that does; 'detail' says which."),
        new("run-ended", 409, "The run has ended and can no longer be stopped.", "Nothing needs to be done; its results stay."),
        new("run-without-results", 409, "The run has not succeeded, or not yet, so it has no results.",
            "Wait until it has, or read 'latest'."),
        new("subscription-inactive", 409, "The subscription is switched off, so nothing is sent for it.",
            "Make it active first: PUT it with \"active\": true."),
        new("too-many-subscriptions", 409, "The portfolio has as many subscriptions as it may.", "Remove one that is no longer needed."),
        new("events-expired", 410, "The event named in 'after' is no longer kept, and what followed it may be gone too.",
            "Read without 'after', from the oldest event that is kept."),
        new("iterations-expired", 410, "The single iterations of the run, which this figure needs, are no longer kept.",
            "Ask for one of the levels that are kept for ever, or for a newer run."),
        new("precondition-failed", 412, "What is there is not what If-Match or If-None-Match says.",
            "Read it again, apply the change to what is there now, and send it with the new ETag."),
        new("too-large", 413, "The body is larger than is taken here.", "Send it in parts; 'detail' says how much is taken."),
        new("unsupported-media-type", 415, "The body's media type is not taken here.", "Send one of the media types listed under /docs."),
        new("unsupported-encoding", 415, "The body is encoded, for example compressed.", "Send it plain, without Content-Encoding."),
        new("idempotency-key-reused", 422, "The Idempotency-Key stands for another request to this address.",
            "Use a new key for a new request."),
        new(Refused, 422, "The request can be read, but what it says is wrong. Nothing of it was kept.",
            "'errors' names every fault with its place, its code and a sentence; correct them and send the request again."),
        new("precondition-required", 428, "The write would replace something and does not say what.",
            "Send If-Match with the ETag of what is there, or * for whatever is there."),
        new("too-many-requests", 429, "The key asks faster than is allowed.", "Try again after the time in Retry-After."),
        new("queue-full", 429, "As many runs of the portfolio wait as may.", "Try again after the time in Retry-After, or stop one of them."),
        new("internal", 500, "The server failed.", "Tell the operator the 'traceId'; the failure is logged under it."),
        new("storage-unavailable", 503, "The storage cannot be used at the moment.",
            "Try again after the time in Retry-After; a write in doubt with the same Idempotency-Key."),
        new("timeout", 503, "The request took longer than is allowed.",
            "Read what is there, or send a write again with the same Idempotency-Key."),
        new(Other, 0, "The request was refused before it reached any resource.", "'status' says why, as HTTP defines it."),
    ];
}
