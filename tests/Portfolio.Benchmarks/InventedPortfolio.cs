using Portfolio.Engine.Draws;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Model.Rules;

namespace Portfolio.Benchmarks;

/// <summary>
/// An invented portfolio of any size, the same for the same size: layered networks of three lanes, PERT and triangular work, costs, a
/// five-day calendar, drivers, an event in each project; with pools every third activity draws on one.
/// </summary>
internal sealed class InventedPortfolio
{
    private const int Lanes = 3, Drivers = 10;
    private static readonly DateOnly Status = new(2026, 11, 30);

    private readonly int pools;
    private long drawn;

    private InventedPortfolio(int pools) => this.pools = pools;

    public static ValidPortfolio Of(int projects, int activities, int pools = 0)
    {
        var invented = new InventedPortfolio(pools);
        var settings = new Settings
        {
            Name = "Invented",
            Currency = "EUR",
            Calendars = [new("week", [.. Enumerable.Range(1, 5).Select(day => (DayOfWeek)day)], [new(2027, 1, 1)], [])],
            DefaultCalendar = "week",
            Drivers =
            [
                .. Enumerable.Range(0, Drivers)
                    .Select(d => new Driver($"d{d}", null, d % 2 == 0 ? 1 : 0.4, new Triangular(0.9, 1, 1.4), null)),
            ],
            Dependence = new Dependence { BetweenProjects = 0.1, Stated = true },
            Pools = [.. Enumerable.Range(0, pools).Select(p => new Pool($"pool{p}", null, Math.Max(2, projects / 2), []))],
        };
        var document = new PortfolioDocument(settings, [.. Enumerable.Range(0, projects).Select(p => invented.Project(p, activities))]);
        return ValidPortfolio.Check(document, out var faults) ?? throw new InvalidDataException(faults[0].Message);
    }

    private Project Project(int p, int activities) => new()
    {
        Id = $"p{p}",
        Programme = $"g{p % 8}",
        Priority = 1 + p % 5,
        StatusDate = Status,
        Correlation = 0.2,
        Overhead = new Overhead(1500, 0),
        Activities = [.. Enumerable.Range(0, activities).Select(Activity)],
        RiskEvents =
        [
            new RiskEvent
            {
                Id = "flood",
                Probability = 0.2,
                Impacts = [new Impact("A0", null, new Triangular(5, 15, 60), new Triangular(20_000, 60_000, 200_000))],
            },
        ],
    };

    // An activity waits for the one before it in its lane and for one of the two before it in the list.
    private Activity Activity(int a) => a % 25 == 24
        ? new Activity { Id = $"A{a}", Milestone = true, Predecessors = Before(a) }
        : new Activity
        {
            Id = $"A{a}",
            Duration = Estimate(3 + 27 * Next()),
            Cost = new ActivityCost(Estimate(10_000 + 90_000 * Next()), new Constant(500 + Math.Floor(2000 * Next())), 0),
            Drivers = [$"d{a % Drivers}"],
            Predecessors = Before(a),
            Demands = pools > 0 && a % 3 == 0 ? [new Demand($"pool{a / 3 % pools}", 1)] : [],
        };

    private IReadOnlyList<Link> Before(int a) => a < Lanes
        ? []
        : Next() < 0.8 ? [new Link($"A{a - Lanes}"), new Link($"A{a - 1 - (int)(2 * Next())}")] : [new Link($"A{a - Lanes}")];

    private Distribution Estimate(double mode) => Next() < 0.7
        ? new Pert(mode * (0.75 + 0.2 * Next()), mode, mode * (1.1 + 0.8 * Next()))
        : new Triangular(mode * (0.75 + 0.2 * Next()), mode, mode * (1.1 + 0.8 * Next()));

    private double Next()
    {
        Span<double> u = stackalloc double[1];
        Uniforms.Fill(1, 0x51, drawn++, u);
        return u[0];
    }
}
