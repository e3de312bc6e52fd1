using Portfolio.Server.Contracts.Results;
using Portfolio.Server.Demo.Start;

namespace Portfolio.Server.Tests.Demo;

/// <summary>The table that ends a start with the demo.</summary>
public class DemoTableTests
{
    private static readonly DateOnly Sunday = new(2026, 11, 29);

    [Fact]
    public void Shows_dates_chances_and_movement_of_every_scope_and_the_contingency()
    {
        var now = Rows(new(2029, 1, 9), new(2028, 10, 23), new(2028, 8, 11));
        var before = Rows(new(2029, 1, 17), new(2028, 10, 22), new(2028, 8, 11));
        var lines = new DemoTable(Sunday, now, before).Render().Split(Environment.NewLine);
        Assert.Equal("Week to 2026-11-29              base        P50         P80         promised    chance  P80 moved", lines[0]);
        Assert.Equal("portfolio                       2028-07-13  2028-11-10  2029-01-09  2028-10-31    40 %  −8 days", lines[1]);
        Assert.Equal("  waterways                     2028-04-26  2028-08-24  2028-10-23  2028-10-31    40 %  +1 day", lines[2]);
        Assert.Equal("    weir-lock                   2028-02-13  2028-06-12  2028-08-11  2028-10-31    40 %  unchanged", lines[3]);
        Assert.Contains("Cost at P80: 412.5 million EUR = base 386.0 + contingency 26.5. Budget 405.3, kept with a chance of 51 %.", lines);
    }

    [Fact]
    public void What_was_not_promised_is_a_dash()
    {
        var rows = Rows(Sunday, Sunday, Sunday).Select(row => row with { Finish = row.Finish with { Commitment = null } }).ToList();
        Assert.Contains("  –                –  unchanged", new DemoTable(Sunday, rows, rows).Render());
    }

    /// <summary>A finish with this P80, its P50 60 and its base 180 days earlier.</summary>
    internal static FinishJson Finish(DateOnly level80) => new()
    {
        Base = level80.AddDays(-180),
        Percentiles = [new(50, level80.AddDays(-60), null, null), new(80, level80, null, null), new(90, level80.AddDays(30), null, null)],
        Commitment = new(new(2028, 10, 31), 0.4),
    };

    internal static CostJson Cost(decimal basis, decimal level80) => new()
    {
        Base = basis,
        BaseProbability = 0.1,
        Mean = basis,
        Sd = 1,
        Percentiles = [new(50, basis, null, null), new(80, level80, null, null)],
        Commitment = new(405_300_000m, 0.507),
    };

    private static List<ResultJson> Rows(DateOnly portfolio, DateOnly programme, DateOnly project) =>
    [
        Row("portfolio", portfolio, ["weir-lock"]),
        Row("programme/waterways", programme, ["weir-lock"]),
        Row("project/weir-lock", project, null),
        Row("milestone/weir-lock/M10", project, null),
    ];

    private static ResultJson Row(string scope, DateOnly level80, string[]? projects) => new()
    {
        Scope = scope,
        Run = "r",
        AsOf = Sunday,
        Revision = 26,
        Projects = projects,
        Finish = Finish(level80),
        Cost = Cost(386_000_000m, 412_500_000m),
    };
}
