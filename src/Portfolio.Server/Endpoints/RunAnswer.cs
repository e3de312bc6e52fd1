using System.Security.Cryptography;
using System.Text;
using System.Text.Json.Serialization.Metadata;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Endpoints;

/// <summary>
/// An answer about one run on its way. Figures never change once a run has ended, so the run, the address and what the caller may see make
/// a strong entity tag without a look at them.
/// </summary>
internal sealed class RunAnswer
{
    private readonly HttpContext http;
    private readonly EntityTagHeaderValue tag;

    private RunAnswer(HttpContext http, StoredRun run, Caller caller, Representation representation)
    {
        (this.http, Run, Representation) = (http, new(caller, run), representation);
        tag = TagOf(http.Request, run, caller, representation);
    }

    public SeenRun Run { get; }

    public Representation Representation { get; }

    public static async Task<RunAnswer> FindAsync(RunQuery query, QueryFaults faults)
    {
        var asOf = RunChoice.AsOf(faults, query.Run, query.AsOf);
        var representation = Representation.Of(query.Http.Request, query.Format, faults);
        faults.Refuse();
        var run = await query.Runs.WithResultsAsync(query.Caller, query.Portfolio, query.Run, asOf, query.Cancellation);
        return new(query.Http, run, query.Caller, representation);
    }

    /// <summary>304 when the client has it already, else the figures as JSON or CSV, with the address at which they stay.</summary>
    /// <param name="read">Reads the figures; null when there are none (404).</param>
    public async Task<IResult> OfAsync<T>(Func<Task<T?>> read, JsonTypeInfo<T> type, Func<T, CsvTable> table)
        where T : class
    {
        if (new Preconditions(http.Request).HasAlready(tag)) return Read.NotModified(http, tag);
        if (await read() is not { } figures) return Problem.NotFound("The run has no such scope.");
        http.Response.GetTypedHeaders().ETag = tag;
        http.Response.Headers.ContentLocation = AddressOf(http.Request, Run.Run);
        return Representation.Answer(figures, type, table);
    }

    private static string AddressOf(HttpRequest request, StoredRun run)
    {
        var path = request.Path.Value!.Replace($"/runs/{RunChoice.Latest}/", $"/runs/{run.Id}/", StringComparison.Ordinal);
        var kept = request.Query.Where(pair => pair.Key is not ("asOf" or "run"));
        var named = path.Contains("/runs/", StringComparison.Ordinal) ? kept : kept.Append(new("run", run.Id));
        return path + QueryString.Create(named);
    }

    private static EntityTagHeaderValue TagOf(HttpRequest request, StoredRun run, Caller caller, Representation representation)
    {
        var seen = caller.Holds(Right.Read, run.Portfolio) ? "*" : string.Join(',', ProjectsOf(caller, run.Portfolio));
        var text = $"{run.ResultDigest}\n{AddressOf(request, run)}\n{(representation.IsCsv ? "csv" : "json")}\n{seen}";
        return EntityTags.OfPart(Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text))));
    }

    private static IEnumerable<string> ProjectsOf(Caller caller, string portfolio) => caller.Grants
        .SelectMany(grant => grant.Projects ?? []).Where(project => caller.Holds(Right.Read, portfolio, project))
        .Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal);
}
