using System.Globalization;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts;

namespace Portfolio.Server.Updates;

/// <summary>Lines and cells of a table, to name faults by.</summary>
internal sealed class CsvPlaces : IFaultPlaces
{
    private readonly List<(string[] Cells, int Line)> rows = [];
    private string[] header = [];

    // By name the first column that has it.
    private Dictionary<string, int> first = [];

    private int headerLine = 1;

    /// <summary>Faults of the table itself: what rules say of a thing one of whose cells cannot be read repeats them.</summary>
    public IReadOnlyList<Fault> Forms { get; set; } = [];

    /// <param name="names">Of the columns, in their order.</param>
    /// <param name="firsts">By name the first column that has it.</param>
    public void Begin(string[] names, Dictionary<string, int> firsts, int line) => (header, first, headerLine) = (names, firsts, line);

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
            var own = first.TryGetValue(name, out var column) ? column : Within(row.Cells, name + ".");
            if (own >= 0)
                return (row.Line, own + 1);
        }
        var hasActivity = first.TryGetValue(CsvColumn.Activity, out var activity) && activity < row.Cells.Length && row.Cells[activity].Length > 0;
        return (row.Line, hasActivity ? activity + 1 : first.GetValueOrDefault(CsvColumn.Project) + 1);
    }

    /// <summary>The first cell that says something of a member below; -1: none.</summary>
    private int Within(string[] cells, string prefix)
    {
        for (var i = 0; i < Math.Min(cells.Length, header.Length); i++)
            if (cells[i].Length > 0 && header[i].StartsWith(prefix, StringComparison.Ordinal))
                return i;
        return -1;
    }

    private static int Number(string text) => int.Parse(text, CultureInfo.InvariantCulture);
}
