using CsvHelper;

namespace Portfolio.Server.Contracts.Csv;

/// <summary>
/// A table as RFC 4180 text: header row, CRLF, ISO dates, dot decimals; a text that a spreadsheet would run as a formula
/// gets an apostrophe in front. Columns are only ever appended.
/// </summary>
/// <param name="Name">Of the file, without ending.</param>
/// <param name="Lines">Cells in the order of the header: text, dates, numbers or null.</param>
internal sealed record CsvTable(string Name, IReadOnlyList<string> Header, IEnumerable<IReadOnlyList<object?>> Lines) : IResult
{
    public const string MediaType = "text/csv";

    private static readonly CsvWriterOptions Options = new() { NewLine = "\r\n", Injection = CsvInjection.Escape };

    public async Task ExecuteAsync(HttpContext http)
    {
        http.Response.ContentType = $"{MediaType}; charset=utf-8; header=present";
        http.Response.Headers.ContentDisposition = $"attachment; filename=\"{Name}.csv\"";
        await http.Response.Body.WriteAsync(ToBytes(), http.RequestAborted);
    }

    public byte[] ToBytes()
    {
        using var bytes = new MemoryStream();
        using (var csv = CsvWriter.Create(bytes, Options, leaveOpen: true))
        {
            csv.WriteHeader([.. Header]);
            foreach (var line in Lines)
            {
                foreach (var cell in line) csv.WriteField(cell);
                csv.EndRecord();
            }
        }
        return bytes.ToArray();
    }
}
