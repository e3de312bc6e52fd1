using System.Globalization;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts;

namespace Portfolio.Server.Updates;

/// <summary>Lines and cells of a table, to name faults by.</summary>
internal sealed class CsvPlaces : IFaultPlaces
{
    private readonly List<(string[] Cells, int Line)> rows = [];
    private string[] header = [];
    private int headerLine = 1;

    /// <summary>Faults of the table itself: what rules say of a thing one of whose cells cannot be read repeats them.</summary>
    public IReadOnlyList<Fault> Forms { get; set; } = [];

    public void Begin(IEnumerable<CsvColumn> columns, int line) =>
        (header, headerLine) = ([.. columns.Select(column => column.Name)], line);

    /// <summary>The number of the row, from 0.</summary>
    public int Add(string[] cells, int line)
    {
        rows.Add((cells, line));
        return rows.Count - 1;
    }

    public IReadOnlyList<FaultJson> Of(IReadOnlyList<Fault> faults)
    {
        var forms = Forms.ToHashSet();
        var spoilt = Forms.Select(fault => fault.Subject).ToHashSet(StringComparer.Ordinal);
        return
        [
            .. faults.Where(fault => forms.Contains(fault) || !spoilt.Contains(fault.Subject)).Select(Placed)
                .OrderBy(fault => fault.Line ?? 0).ThenBy(fault => fault.Column ?? 0),
        ];
    }

    private FaultJson Placed(Fault fault)
    {
        if (fault.Path.Length == 0)
            return FaultJson.From(fault);
        var steps = fault.Path.Split('/').Skip(1).ToArray();
        var (line, column) = steps[0] == "header"
            ? (headerLine, steps.Length > 1 ? Number(steps[1]) + 1 : 1)
            : InRow(rows[Number(steps[1])], steps[2..]);
        return FaultJson.From(fault) with { Path = null, Line = line, Column = column };
    }

    /// <summary>The member's own cell, or the first that says something of it, or of what it belongs to, or the row's key.</summary>
    private (int Line, int Column) InRow((string[] Cells, int Line) row, string[] steps)
    {
        for (var length = steps.Length; length > 0; length--)
        {
            var name = string.Join('.', steps[..length].Select(step => step.Replace("~1", "/", StringComparison.Ordinal)));
            var own = Array.IndexOf(header, name);
            if (own < 0)
                own = Array.FindIndex(header, each => each.StartsWith(name + ".", StringComparison.Ordinal) && IsFilled(row.Cells, each));
            if (own >= 0)
                return (row.Line, own + 1);
        }
        var key = IsFilled(row.Cells, CsvColumn.Activity) ? CsvColumn.Activity : CsvColumn.Project;
        return (row.Line, Math.Max(Array.IndexOf(header, key), 0) + 1);
    }

    private bool IsFilled(string[] cells, string column) =>
        Array.IndexOf(header, column) is >= 0 and var i && i < cells.Length && cells[i].Length > 0;

    private static int Number(string text) => int.Parse(text, CultureInfo.InvariantCulture);
}
