using System.Text;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Updates as a table, sound or with something done to cells or bytes.</summary>
internal static class RandomTable
{
    private static readonly string[] Columns =
    [
        "name", "duration", "duration.type", "duration.low", "duration.high", "cost.fixed", "cost.perDay", "actualStart", "statusDate",
        "priority", "tags.region", "commitments.finish", "overhead.perDay",
    ];

    private static readonly string[] Cells =
        ["", "", "", "Piles", "uniform", "5", "9.5", "100", "2027-01-04", "null", "true", "\"a, \"\"b\"\"\""];

    public static byte[] Of(Dice dice)
    {
        var columns = dice.Some(Columns, dice.Whole(1, 4));
        var rows = new List<IEnumerable<string>> { (IEnumerable<string>)["project", "activity", "create", .. columns] };
        for (var i = dice.Whole(0, 6); i > 0; i--)
            rows.Add([.. Subject(dice), .. columns.Select(column => Cell(column, dice))]);
        var text = string.Join(dice.Pick("\r\n", "\n"), rows.Select(row => string.Join(',', row)));
        var bytes = Encoding.UTF8.GetBytes(text);
        return dice.Chance(0.3) ? Damage.Bytes(bytes, dice) : bytes;
    }

    private static string[] Subject(Dice dice) =>
        [dice.Pick("weir", "project-0", "project-1"), dice.Pick("", "A0", "A1", "A", "new"), dice.Pick("", "true")];

    private static string Cell(string column, Dice dice) => column switch
    {
        _ when dice.Chance(0.05) => dice.Pick(NastyValues.Texts),
        _ when dice.Chance(0.1) => dice.Pick(Cells),
        "name" => "Piles",
        "duration.type" => "uniform",
        "duration" or "duration.low" or "cost.fixed" or "cost.perDay" or "overhead.perDay" => $"{dice.Whole(1, 9)}",
        "duration.high" => "20",
        "statusDate" or "actualStart" => "2027-01-04",
        "priority" => "1",
        "commitments.finish" => "2028-01-31",
        _ => "a",
    };
}
