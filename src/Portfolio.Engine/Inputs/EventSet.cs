using Portfolio.Engine.Distributions;
using Portfolio.Engine.Draws;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;

namespace Portfolio.Engine.Inputs;

/// <summary>
/// Risk events of the portfolio and of its projects with what they do; a taken response has replaced probability and impacts and its
/// cost is certain (contract section 4, item 4).
/// </summary>
internal sealed class EventSet
{
    public required CompiledEvent[] Events { get; init; }

    /// <summary>[project] certain cost of the responses taken, money.</summary>
    public required double[] ResponseCost { get; init; }

    /// <summary>[activity] row of its delays, or −1 when no event delays it.</summary>
    public required int[] DelayRow { get; init; }

    public required int DelayRows { get; init; }

    public static EventSet Build(Network network, Settings settings, Func<string, bool>? held)
    {
        var builder = new Builder(network, held);
        foreach (var stated in settings.RiskEvents)
            builder.Add(null, -1, stated);
        for (var p = 0; p < network.Projects.Count; p++)
        {
            foreach (var stated in network.Projects[p].RiskEvents)
                builder.Add(network.Projects[p].Id, p, stated);
        }
        return builder.Build();
    }

    private sealed class Builder(Network network, Func<string, bool>? held)
    {
        private readonly List<CompiledEvent> _events = [];
        private readonly double[] _responseCost = new double[network.Projects.Count];
        private readonly int[] _delayRow = [.. Enumerable.Repeat(-1, network.Count)];
        private readonly Dictionary<string, int> _projects = Index(network);
        private readonly Dictionary<(string, string), int> _activities = Enumerable.Range(0, network.Count)
            .ToDictionary(a => (network.Projects[network.ProjectOf[a]].Id, network.Activities[a].Id));
        private int _delayRows;

        public void Add(string? ownProject, int project, RiskEvent stated)
        {
            var taken = stated.Responses.FirstOrDefault(r => r.Taken);
            if (taken is not null)
                _responseCost[project >= 0 ? project : _projects[taken.Project!]] += (double)taken.Cost;
            var key = ownProject is null ? $"event/{stated.Id}" : $"project/{ownProject}/event/{stated.Id}";
            var probability = taken?.Probability ?? stated.Probability;
            if (probability <= 0 || held?.Invoke(key) == true)
                return;
            var impacts = (taken?.Impacts ?? stated.Impacts)
                .Select((x, k) => Impact(ownProject, project, x, $"{key}/impact/{k}")).OfType<CompiledImpact>();
            _events.Add(new CompiledEvent(DrawKey.Hash(key), probability, [.. impacts]));
        }

        public EventSet Build() => new()
        {
            Events = [.. _events],
            ResponseCost = _responseCost,
            DelayRow = _delayRow,
            DelayRows = _delayRows,
        };

        // Impacts on finished work are ignored.
        private CompiledImpact? Impact(string? ownProject, int project, Impact stated, string key)
        {
            var activity = stated.Activity is null ? -1 : _activities[NetworkBuilder.Split(stated.Activity, ownProject ?? "")];
            if (activity >= 0 && network.Finished(activity))
                return null;
            var owner = activity >= 0 ? network.ProjectOf[activity] : stated.Project is null ? project : _projects[stated.Project];
            if (stated.Delay is not null && _delayRow[activity] < 0)
                _delayRow[activity] = _delayRows++;
            return new CompiledImpact(
                DrawKey.Hash(key), activity, owner,
                stated.Delay is null ? null : Marginal.Of(stated.Delay), stated.Cost is null ? null : Marginal.Of(stated.Cost));
        }

        private static Dictionary<string, int> Index(Network network) =>
            Enumerable.Range(0, network.Projects.Count).ToDictionary(p => network.Projects[p].Id, StringComparer.Ordinal);
    }
}

/// <summary>An event: it happens when its draw is below the probability.</summary>
internal sealed record CompiledEvent(ulong Key, double Probability, CompiledImpact[] Impacts);

/// <summary>
/// An impact; its severity's key, the activity it acts on or −1, the project that pays, delay in working days, cost in money.
/// </summary>
internal sealed record CompiledImpact(ulong Key, int Activity, int Project, Marginal? Delay, Marginal? Cost);
