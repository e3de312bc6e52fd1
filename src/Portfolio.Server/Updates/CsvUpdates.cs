using System.Buffers;
using System.Globalization;
using System.Text;
using System.Text.Unicode;
using CsvHelper;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Updates;

/// <summary>
/// Updates sent as a table (RFC 4180): <c>project,activity,create</c> and dotted members. A row without activity speaks of the project.
/// Inside the server the cells of row r stand at <c>/rows/r/…</c>.
/// </summary>
internal sealed class CsvUpdates
{
    private static readonly CsvReaderOptions Options = new()
    {
        Separator = ',', HasHeader = false, TrackLineNumbers = true, MalformedData = CsvMalformedDataHandling.Throw,
    };

    private readonly CsvPlaces places = new();
    private readonly UpdateSet set;
    private CsvColumn[] columns = [];

    // By name the first column that has it.
    private Dictionary<string, int> first = [];

    private CsvUpdates() => set = new UpdateSet { Places = places };

    /// <exception cref="JsonRefused">It is not UTF-8, or the quoting is broken, so that lines and cells cannot be told.</exception>
    public static UpdateSet Read(ReadOnlyMemory<byte> csv)
    {
        if (!Utf8.IsValid(csv.Span))
            throw NotUtf8(csv.Span);
        try
        {
            using var reader = CsvReader.Create(csv, Options);
            var updates = new CsvUpdates();
            updates.Read(reader);
            updates.places.Forms = [.. updates.set.Faults];
            return updates.set;
        }
        catch (CsvFormatException malformed)
        {
            var line = (int)malformed.LineNumber;
            throw JsonRefused.Table($"The quotes of the record that begins at line {line} are not closed or doubled.", line);
        }
    }

    private static JsonRefused NotUtf8(ReadOnlySpan<byte> csv)
    {
        var good = 0;
        while (Rune.DecodeFromUtf8(csv[good..], out _, out var length) == OperationStatus.Done)
            good += length;
        var line = csv[..good].Count((byte)'\n') + 1;
        return JsonRefused.Table($"Line {line} holds letters that are not UTF-8; save the table as CSV in UTF-8.", line);
    }

    private void Read(CsvReader reader)
    {
        if (reader.Read())
            ReadHeader(reader);
        else
            Refuse("/header", "header", FaultCodes.MemberMissing, "The header row is missing.");
        while (reader.Read())
            ReadRow(reader);
    }

    private void ReadHeader(CsvReader reader)
    {
        columns = [.. Enumerable.Range(0, reader.FieldCount).Select(i => new CsvColumn(reader.GetString(i).Trim()))];
        first = new Dictionary<string, int>(columns.Length, StringComparer.Ordinal);
        places.Begin([.. columns.Select(column => column.Name)], first, (int)reader.LineNumber);
        for (var i = 0; i < columns.Length; i++)
        {
            var (column, path) = (columns[i], $"/header/{i}");
            if (!first.TryAdd(column.Name, i))
                Refuse(path, column.Name, FaultCodes.ColumnRepeated, $"The column '{column.Name}' is there twice.");
            else if (column.OfProject == CellKind.List || column.OfActivity == CellKind.List)
                Refuse(path, column.Name, FaultCodes.ColumnList, $"'{column.Name}' is a list; a table cannot hold it, send it as JSON.");
            else if (!column.IsKey && column is { OfProject: CellKind.None, OfActivity: CellKind.None })
                Refuse(path, column.Name, FaultCodes.ColumnUnknown, Unknown(column));
        }
        if (!first.ContainsKey(CsvColumn.Project))
            Refuse("/header", "header", FaultCodes.MemberMissing, "The column 'project' is missing.");
    }

    // What spreadsheets write where the comma is the sign before decimals.
    private string Unknown(CsvColumn column) => columns.Length == 1 && column.Name.AsSpan().ContainsAny(';', '\t')
        ? "The header is one cell only: cells must be separated by commas, not by semicolons or tabs."
        : $"Neither projects nor activities have a member '{column.Name}'.";

    private void ReadRow(CsvReader reader)
    {
        string[] cells = [.. Enumerable.Range(0, reader.FieldCount).Select(reader.GetString)];
        if (cells.All(cell => cell.Length == 0))
            return;
        var path = string.Create(CultureInfo.InvariantCulture, $"/rows/{places.Add(cells, (int)reader.LineNumber)}");
        if (cells.Length > columns.Length)
            Refuse(path, "row", FaultCodes.RowCells, $"The row has {cells.Length} cells, the header {columns.Length}.");
        else if (Cell(cells, CsvColumn.Project) is not { Length: > 0 } project)
            Refuse($"{path}/project", "row", FaultCodes.MemberMissing, "'project' is missing.");
        else
            ReadRow(cells, path, project, Cell(cells, CsvColumn.Activity), Cell(cells, CsvColumn.Create));
    }

    private void ReadRow(string[] cells, string path, string project, string activity, string create)
    {
        var subject = activity.Length > 0 ? $"{project}/{activity}" : project;
        if (create.Length > 0 && CsvRow.Flag(create) is null)
            Refuse($"{path}/create", subject, FaultCodes.CellValue, "'create' must be true, false or empty.");
        var row = new CsvRow(path, subject, set.Faults);
        for (var i = 0; i < cells.Length; i++)
        {
            var column = columns[i];
            var kind = activity.Length > 0 ? column.OfActivity : column.OfProject;
            // What is wrong with a column itself is said once, at its header.
            if (cells[i].Length > 0 && !column.IsKey && Stands(column) && first[column.Name] == i)
                row.Add(column, kind, cells[i]);
        }
        row.Finish();
        var update = set.Of(project, $"{path}/project");
        if (activity.Length > 0)
        {
            var sent = new SentThing(path, $"{path}/activity", row.Members);
            set.Add(update, new ActivityUpdate(activity, sent, CsvRow.Flag(create) == true));
        }
        else
            set.Add(update, new SentThing(path, $"{path}/project", row.Members));
    }

    private static bool Stands(CsvColumn column) =>
        column is not { OfProject: CellKind.None, OfActivity: CellKind.None }
        && column.OfProject != CellKind.List && column.OfActivity != CellKind.List;

    private string Cell(string[] cells, string column) => first.TryGetValue(column, out var i) && i < cells.Length ? cells[i] : "";

    private void Refuse(string path, string subject, string code, string message) =>
        set.Faults.Add(new Fault(path, subject, code, message));
}
