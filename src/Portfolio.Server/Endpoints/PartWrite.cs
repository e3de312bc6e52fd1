using System.Security.Claims;
using Microsoft.AspNetCore.Mvc;
using Microsoft.Extensions.Options;
using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Documents;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>What a write of one part brings along.</summary>
internal sealed record PartWrite(
    [FromRoute(Name = "portfolio")] string Portfolio,
    [FromQuery(Name = "note")] string? Note,
    ClaimsPrincipal User,
    HttpContext Http,
    PartWriting Writing,
    DocumentReader Reader,
    IOptions<LimitOptions> Limits,
    CancellationToken Cancellation)
{
    public Preconditions Conditions { get; } = new(Http.Request);

    /// <summary>False for who may only submit to this part.</summary>
    public bool Manages(string part) => Caller.Holds(Right.Manage, Portfolio, part);

    public bool Submits(string project) => Caller.Holds(Right.Submit, Portfolio, project);

    public Caller Caller => User.Caller();

    public Task<RequestBody> BodyAsync() => RequestBody.ReadAsync(Http.Request, Limits.Value.Body);

    /// <summary>Writes and answers.</summary>
    /// <param name="part">The settings or the project in the address.</param>
    /// <param name="right">What the caller needs on it.</param>
    public async Task<IResult> ToAsync(string part, string action, Right right, Func<DocumentState, Task<Draft>> draw) =>
        Answer(Http, await Writing.WriteAsync(
            Caller, Of(action, right) with { Parts = [part] }, draw, Http.Remembers<PartsWritten>(Answer), Cancellation));

    /// <summary>The write as the store knows it.</summary>
    public DocumentWrite Of(string action, Right right) => new()
    {
        Portfolio = Portfolio,
        Right = right,
        Note = Notes.Checked(Note),
        Action = action,
        Object = Http.Request.Path.Value!["/v1/".Length..],
    };

    private IResult Answer(HttpContext to, PartsWritten done) => Written.Answer(to, Portfolio, done.Result, done.Tag, done.Creates);

    /// <summary>The right that the caller uses here: to manage if it has it, otherwise to submit.</summary>
    public Right Used(string part) => Manages(part) ? Right.Manage : Right.Submit;
}
