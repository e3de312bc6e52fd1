using System.Security.Claims;
using Microsoft.AspNetCore.Mvc;
using Portfolio.Server.Access;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>What a read of the document or of one part brings along.</summary>
/// <param name="Portfolio">The portfolio's id.</param>
/// <param name="Revision">A revision; left out: the newest.</param>
/// <param name="AsOf">The revision that was current at the end of this local date.</param>
internal sealed record PartRead(
    [FromRoute(Name = "portfolio")] string Portfolio,
    [FromQuery(Name = "revision")] long? Revision,
    [FromQuery(Name = "asOf")] string? AsOf,
    ClaimsPrincipal User,
    HttpContext Http,
    DocumentStore Documents,
    RevisionOfDate Revisions,
    CancellationToken Cancellation)
{
    public Caller Caller => User.Caller();

    /// <summary>The part asked for; who may submit to a project may read it back.</summary>
    /// <exception cref="RequestRefused">The key has no right to it (403), or there is none then (404).</exception>
    public async Task<StoredPart> FindAsync(string part)
    {
        var mayRead = Caller.Holds(Right.Read, Portfolio, part)
            || (part != PartNames.Settings && Caller.Holds(Right.Submit, Portfolio, part));
        if (!mayRead)
            throw new RequestRefused(Problem.Forbidden());
        return await Documents.ReadPartAsync(Caller, Portfolio, part, await NumberAsync(), Cancellation)
            ?? throw new RequestRefused(Problem.NotFound());
    }

    /// <summary>The revision that is asked for; null: the newest.</summary>
    /// <exception cref="RequestRefused">The query is wrong (422), or there was no revision then (404).</exception>
    public async Task<long?> NumberAsync()
    {
        var faults = new QueryFaults();
        if (Revision is not null && AsOf is not null)
            faults.Add("asOf", "Give 'revision' or 'asOf', not both.");
        var asked = faults.Date("asOf", AsOf);
        faults.Refuse();
        if (asked is not { } date)
            return Revision;
        return await Revisions.FindAsync(Portfolio, date, Cancellation)
            ?? throw new RequestRefused(Problem.NotFound("The portfolio had no revision at that date."));
    }
}
