using System.Text.Json.Nodes;
using System.Text.RegularExpressions;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Updates;

/// <summary>
/// The members that the cells of one row give. Empty cells are not sent; the cells of one object form it whole, but for cost and overhead.
/// </summary>
internal sealed partial class CsvRow(string path, string subject, List<Fault> faults)
{
    private const string Null = "null";

    public JsonObject Members { get; } = [];

    /// <param name="kind">What the column holds for the thing that the row speaks of.</param>
    public void Add(CsvColumn column, CellKind kind, string cell)
    {
        if (kind is CellKind.None or CellKind.List)
            Refuse(column, FaultCodes.CellPlace, $"'{column.Name}' cannot be set in a row that speaks of {subject}.");
        else if (cell != Null && Value(kind, cell) is null)
            Refuse(column, FaultCodes.CellValue, Expected(kind, column));
        else if (!Set(column.Path, cell == Null ? null : Value(kind, cell)))
            Refuse(column, FaultCodes.CellConflict, $"'{column.Name}' says something else than another cell of this row.");
    }

    /// <summary>What is stated whole loses its nulls, and is null itself when nothing else is left.</summary>
    public void Finish() => Finish(Members);

    private static void Finish(JsonObject owner)
    {
        foreach (var (name, value) in owner.ToList())
        {
            if (value is not JsonObject inner)
                continue;
            if (name is "cost" or "overhead")
            {
                Finish(inner);
                continue;
            }
            foreach (var gone in inner.Where(member => member.Value is null).Select(member => member.Key).ToList())
                inner.Remove(gone);
            if (inner.Count == 0)
                owner[name] = null;
        }
    }

    /// <summary>False when a cell of this row stands in the way.</summary>
    private bool Set(IReadOnlyList<string> steps, JsonNode? value)
    {
        var owner = Members;
        foreach (var step in steps.SkipLast(1))
        {
            if (!owner.ContainsKey(step))
                owner[step] = new JsonObject();
            if (owner[step] is not JsonObject inner)
                return false;
            owner = inner;
        }
        return owner.TryAdd(steps[^1], value);
    }

    private static JsonNode? Value(CellKind kind, string cell) => kind switch
    {
        CellKind.Text => JsonValue.Create(cell),
        CellKind.Number => Number().IsMatch(cell) ? JsonNode.Parse(cell) : null,
        CellKind.Flag => Flag(cell) is { } flag ? JsonValue.Create(flag) : null,
        _ => null,
    };

    /// <summary>Spreadsheets write them in capitals.</summary>
    public static bool? Flag(string cell) =>
        cell.Equals("true", StringComparison.OrdinalIgnoreCase) ? true
        : cell.Equals("false", StringComparison.OrdinalIgnoreCase) ? false
        : null;

    private static string Expected(CellKind kind, CsvColumn column) => kind switch
    {
        CellKind.Number => $"'{column.Name}' must be a number with a dot, such as 12.5, or null.",
        CellKind.Flag => $"'{column.Name}' must be true, false or null.",
        _ => $"'{column.Name}' has columns of its own for its members; only null can stand here.",
    };

    private void Refuse(CsvColumn column, string code, string message) =>
        faults.Add(new Fault($"{path}/{string.Join('/', column.Path.Select(Place.Escape))}", subject, code, message));

    // A number as JSON has it.
    [GeneratedRegex(@"^-?(0|[1-9][0-9]*)(\.[0-9]+)?([eE][+-]?[0-9]+)?$")]
    private static partial Regex Number();
}
