using Portfolio.Model.Distributions;

namespace Portfolio.Model.Documents;

/// <summary>Something that may happen once, with what it does to activities or to a project's cost.</summary>
public sealed record RiskEvent
{
    public required string Id { get; init; }

    public string? Name { get; init; }

    /// <summary>0–1.</summary>
    public required double Probability { get; init; }

    public IReadOnlyList<Impact> Impacts { get; init; } = [];

    public IReadOnlyList<Response> Responses { get; init; } = [];
}

/// <summary>
/// Effect of an event. In a project <see cref="Activity"/> is an activity's id or null for a cost to the project; in the settings it is
/// <c>project/activity</c>, or <see cref="Project"/> names the project that bears the cost.
/// </summary>
/// <param name="Delay">Working days.</param>
/// <param name="Cost">Money; negative for an opportunity.</param>
public sealed record Impact(string? Activity, string? Project, Distribution? Delay, Distribution? Cost);

/// <summary>Something that can be done about an event. When taken it replaces probability and impacts and adds its certain cost.</summary>
public sealed record Response
{
    public required string Id { get; init; }

    public string? Name { get; init; }

    /// <summary>Certain cost, money.</summary>
    public decimal Cost { get; init; }

    /// <summary>0–1 once taken; left out: 0.</summary>
    public double Probability { get; init; }

    public IReadOnlyList<Impact> Impacts { get; init; } = [];

    public bool Taken { get; init; }

    /// <summary>Who pays; only of a response to a portfolio's event.</summary>
    public string? Project { get; init; }
}
