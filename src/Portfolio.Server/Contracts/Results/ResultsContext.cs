using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Serialization;

namespace Portfolio.Server.Contracts.Results;

/// <summary>Generated readers and writers of results as they are kept and served.</summary>
[JsonSerializable(typeof(ResultJson))]
[JsonSerializable(typeof(ResultListJson))]
[JsonSerializable(typeof(OutcomesJson))]
[JsonSerializable(typeof(SeriesJson))]
[JsonSerializable(typeof(ContingencyJson))]
[JsonSerializable(typeof(IReadOnlyList<WarningJson>))]
internal sealed partial class ResultsContext : JsonSerializerContext
{
    public static readonly ResultsContext Plain = new(new JsonSerializerOptions
    {
        PropertyNamingPolicy = JsonNamingPolicy.CamelCase,
        DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull,
        // Kept and served as application/json, never inside a page: letters stay readable.
        Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
    });
}
