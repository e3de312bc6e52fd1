using System.Globalization;
using System.Security.Claims;
using System.Security.Cryptography;
using System.Text;
using Microsoft.Net.Http.Headers;
using Portfolio.Engine.Results;
using Portfolio.Server.Access;
using Portfolio.Server.Feeds;
using Portfolio.Server.Http;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;

namespace Portfolio.Server.Endpoints;

/// <summary>Dates as a calendar that programs subscribe to; they present the key as password of Basic.</summary>
internal static class CalendarEndpoints
{
    public static void MapCalendar(this IEndpointRouteBuilder portfolio) =>
        portfolio.MapGet("/calendar.ics", Get).WithName("getCalendar").WithTags("Results").Needs(Right.Read)
            .Produces<string>(StatusCodes.Status200OK, CalendarText.MediaType).ReadsConditionally().Refuses(409, 410, 422);

    /// <summary>The date of a level and the promised finish of everything that the key may read, as an RFC 5545 calendar.</summary>
    /// <param name="level">Confidence level; left out: 80 when it is configured, else the greatest configured one.</param>
    /// <param name="run">A run's id; left out: the run that stands for <c>asOf</c>, or the latest.</param>
    /// <param name="asOf">A date; the run that stands for it or the nearest earlier one.</param>
    internal static async Task<IResult> Get(
        string portfolio, ClaimsPrincipal user, CalendarReading calendars, RunChoice runs, HttpContext http,
        CancellationToken cancellation, string? level = null, string? run = null, string? asOf = null)
    {
        var faults = new QueryFaults();
        Level? asked = level is null ? null : LevelParameter.One(faults, "level", level);
        var date = RunChoice.AsOf(faults, run ?? RunChoice.Latest, asOf);
        faults.Refuse();
        var caller = user.Caller();
        var seen = new SeenRun(
            caller, await runs.WithResultsAsync(caller, portfolio, run ?? RunChoice.Latest, date, cancellation));
        var shown = asked ?? await calendars.UsualLevelAsync(seen, cancellation);
        var sequence = await calendars.SequenceAsync(seen, cancellation);
        var tag = TagOf(seen, shown, sequence);
        if (new Preconditions(http.Request).HasAlready(tag))
            return Read.NotModified(http, tag);
        http.Response.GetTypedHeaders().ETag = tag;
        return TypedResults.Bytes(await calendars.ReadAsync(seen, shown, sequence, cancellation), CalendarText.ContentType);
    }

    // All that decides the bytes: the run never changes, and keys limited to projects see fewer entries.
    private static EntityTagHeaderValue TagOf(SeenRun run, Level level, int sequence)
    {
        var projects = run.Caller.Grants.SelectMany(grant => grant.Projects ?? [])
            .Where(project => run.Caller.Holds(Right.Read, run.Portfolio, project)).Distinct().Order(StringComparer.Ordinal);
        var seen = run.Caller.Holds(Right.Read, run.Portfolio) ? "*" : string.Join(',', projects);
        var text = string.Create(CultureInfo.InvariantCulture, $"{run.Id}\n{run.Run.ResultDigest}\n{level}\n{sequence}\n{seen}");
        return EntityTags.OfPart(Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text))));
    }
}
