using System.Text.Json.Serialization.Metadata;
using Microsoft.Net.Http.Headers;
using Portfolio.Server.Contracts.Csv;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>JSON or CSV: <c>?format=</c> decides, else <c>Accept</c> (RFC 9110, section 12.5.1), else JSON.</summary>
internal sealed class Representation
{
    private const string JsonType = "application/json";

    private Representation(bool isCsv) => IsCsv = isCsv;

    public bool IsCsv { get; }

    /// <exception cref="RequestRefused">The request accepts neither (406).</exception>
    public static Representation Of(HttpRequest request, string? format, QueryFaults faults)
    {
        request.HttpContext.Response.Headers.Vary = HeaderNames.Accept;
        if (format is not null) return new(faults.Word("format", format, "json", ["json", "csv"]) == "csv");
        var accepted = request.GetTypedHeaders().Accept;
        if (accepted.Count == 0) return new(isCsv: false);
        var (json, csv) = (MediaTypes.Quality(accepted, JsonType), MediaTypes.Quality(accepted, CsvTable.MediaType));
        if (json == 0 && csv == 0)
            throw new RequestRefused(MediaTypes.Unacceptable([JsonType, CsvTable.MediaType]));
        return new(csv > json);
    }

    public IResult Answer<T>(T value, JsonTypeInfo<T> type, Func<T, CsvTable> table) =>
        IsCsv ? table(value) : TypedResults.Json(value, type);
}
