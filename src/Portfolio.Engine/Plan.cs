using Portfolio.Engine.Dependence;
using Portfolio.Engine.Inputs;
using Portfolio.Engine.Networks;
using Portfolio.Engine.Pools;
using Portfolio.Engine.Results;
using Portfolio.Engine.Runs;
using Portfolio.Model.Documents;
using Portfolio.Model.Rules;

namespace Portfolio.Engine;

/// <summary>
/// A portfolio compiled for simulation: networks in flat arrays, marginals as tables, dependence factored, the order at the pools fixed.
/// Immutable and pure: results depend on the document, the seed and the iteration alone (contract section 4). Safe to share between
/// threads.
/// </summary>
public sealed class Plan
{
    private Plan(PortfolioDocument document, CompileOptions options)
    {
        var settings = document.Settings;
        Document = document;
        MinorPerUnit = Money.MinorPerUnit(settings.Currency);
        Network = NetworkBuilder.Build(document);
        Estimates = EstimateSet.Build(Network, settings, options.Held);
        Events = EventSet.Build(Network, settings, options.Held);
        Forks = ForkSet.Build(Network, options.Held);
        Dependence = DependenceModel.Build(settings, document.Projects);
        Drivers = [.. settings.Drivers.Select(d => new DriverFactors(d))];
        Stages = Stages.Of(Network);
        Layout = RowLayout.Compact(Network, Stages);
        var inputs = new BaseInputs(Network, Estimates, Events, Forks);
        if (Stages.Dispatched.Length > 0)
        {
            var latest = LatestFinish.Of(Network, inputs);
            Pools = PoolNetworkBuilder.Build(Network, Stages, settings, Estimates, latest);
            if (settings.PoolRule == PoolRule.InOrder)
                SetLine(settings, latest, inputs, options.KeepOrder);
        }
        Base = BaseOutcome.Of(this, inputs);
        Milestones = MilestoneInfo.List(Network);
        Warnings = PlanWarnings.Of(this);
    }

    /// <summary>Engine version: a change of bits for equal inputs changes it. Kept with every run.</summary>
    public const string EngineVersion = "2";

    public PortfolioDocument Document { get; }

    /// <summary>Outcome of one iteration at the base values.</summary>
    public BaseOutcome Base { get; }

    /// <summary>Milestones in document order; their place here is their place in samples.</summary>
    public IReadOnlyList<MilestoneInfo> Milestones { get; }

    /// <summary>Cautions about the model: reverse activities, dependence without effect, repaired correlations …</summary>
    public IReadOnlyList<Warning> Warnings { get; }

    /// <summary>The order of rule <c>inOrder</c>, to be kept by scenarios and replays; empty under <c>passing</c>.</summary>
    public IReadOnlyList<ActivityId> Order { get; private set; } = [];

    /// <summary>Minor units in a unit of the currency.</summary>
    public double MinorPerUnit { get; }

    internal Network Network { get; }

    internal EstimateSet Estimates { get; }

    internal EventSet Events { get; }

    internal ForkSet Forks { get; }

    internal DependenceModel Dependence { get; }

    internal DriverFactors[] Drivers { get; }

    internal Stages Stages { get; }

    internal RowLayout Layout { get; }

    internal PoolNetwork? Pools { get; }

    /// <summary>
    /// The dispatched part in the order of rule <c>inOrder</c>, as locals of <see cref="Pools"/>; null under <c>passing</c>.
    /// </summary>
    internal int[]? LocalLine { get; private set; }

    /// <summary>Compiles a document that breaks no rule.</summary>
    /// <exception cref="ArgumentException">Correlations contradict each other or stated percentiles have no solution; see the checks of
    /// Dependence and Distributions.</exception>
    public static Plan Compile(ValidPortfolio portfolio, CompileOptions? options = null) =>
        new(portfolio.Document, options ?? CompileOptions.None);

    /// <summary>
    /// Simulates iterations <paramref name="first"/> … first + count − 1 and hands each block of <see cref="BlockSamples.Size"/> to
    /// <paramref name="sink"/> when it is complete (from the threads that work, in any order). Returns when all are done.
    /// </summary>
    /// <param name="seed">0…2⁵³−1.</param>
    /// <param name="first">First iteration, a multiple of the block size.</param>
    /// <param name="count">Number of iterations, at least 1.</param>
    /// <param name="options">Threads and progress.</param>
    /// <param name="sink">Receives complete blocks; an exception it throws ends the run and is thrown here.</param>
    /// <param name="cancellation">Looked at every few milliseconds.</param>
    /// <exception cref="OperationCanceledException">Cancelled; blocks already handed over stay valid.</exception>
    public void Run(
        long seed, long first, int count, RunOptions options, Action<BlockSamples> sink, CancellationToken cancellation = default) =>
        new PlanRun(this, (ulong)seed, first, count, options, sink).Work(cancellation);

    private void SetLine(Settings settings, int[] latest, BaseInputs inputs, IReadOnlyList<ActivityId>? keep)
    {
        var everything = Stages.Whole(Network);
        var line = keep is not null
            ? Line.Kept(Network, keep)
            : Line.OfBase(Network, PoolNetworkBuilder.Build(Network, everything, settings, Estimates, latest), everything, inputs);
        Order = [.. line.Select(a => Line.IdOf(Network, a))];
        var local = new Dictionary<int, int>();
        for (var l = 0; l < Pools!.Count; l++)
            local[Pools.Activity[l]] = l;
        LocalLine = [.. line.Where(Stages.IsDispatched).Select(a => local[a])];
    }
}
