using Portfolio.Engine.Results;
using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Events;
using Portfolio.Server.Results;

namespace Portfolio.Server.Subscriptions;

/// <summary>What each type of wanted event must and may say. What is left out is filled in, so that equal wishes are equal.</summary>
/// <param name="kept">The levels that runs keep.</param>
internal sealed class WantedRules(Reading reading, IReadOnlyCollection<Level> kept)
{
    private const int MostDays = 36_500;

    public WantedEventJson Read(WantedEventJson sent, Place place)
    {
        switch (reading.Required(place, "type", sent.Type))
        {
            case EventTypes.LevelMoved:
                return LevelMoved(sent, place);
            case EventTypes.CommitmentBelow:
                return CommitmentBelow(sent, place);
            case EventTypes.EstimatesStale:
                Refuse(sent with { Days = null }, place);
                Days(sent, place, whole: true);
                return new WantedEventJson { Type = sent.Type, Days = sent.Days };
            case { Length: > 0 } plain when EventTypes.Wanted.Contains(plain, StringComparer.Ordinal):
                Refuse(sent, place);
                return new WantedEventJson { Type = plain };
            case { Length: > 0 }:
                reading.Refuse(
                    place, "type", FaultCodes.TypeUnknown, $"'type' must be one of {string.Join(", ", EventTypes.Wanted)}.");
                return sent;
            default:
                return sent;
        }
    }

    private WantedEventJson LevelMoved(WantedEventJson sent, Place place)
    {
        Refuse(sent with { Scope = null, Metric = null, Level = null, Days = null, Amount = null, Every = null }, place);
        var metric = Word(place, "metric", sent.Metric, Metrics.Finish, Metrics.All);
        if (metric == Metrics.Finish)
        {
            Days(sent, place, whole: false);
            Unknown(place, "amount", sent.Amount, "a finish moves by 'days'");
        }
        else
        {
            Amount(sent, place);
            Unknown(place, "days", sent.Days, "money moves by 'amount'");
        }
        return new WantedEventJson
        {
            Type = sent.Type,
            Scope = Scope(sent, place, metric),
            Metric = metric,
            Level = KeptLevel(sent, place),
            Days = sent.Days,
            Amount = sent.Amount,
            Every = Word(place, "every", sent.Every, Intervals.Week, Intervals.All),
        };
    }

    private WantedEventJson CommitmentBelow(WantedEventJson sent, Place place)
    {
        Refuse(sent with { Scope = null, Metric = null, Probability = null }, place);
        var metric = Word(place, "metric", sent.Metric, Metrics.Finish, [Metrics.Finish, Metrics.Cost]);
        if (sent.Probability is null)
            reading.Missing(place, "probability");
        else if (sent.Probability is not (> 0 and <= 1))
            reading.Refuse(place, "probability", SubscriptionCodes.OutOfRange, "'probability' must be above 0 and at most 1.");
        return new WantedEventJson
        {
            Type = sent.Type, Scope = Scope(sent, place, metric), Metric = metric, Probability = sent.Probability,
        };
    }

    /// <summary>Whatever is left over is not a member of the type.</summary>
    private void Refuse(WantedEventJson rest, Place place)
    {
        (string Member, object? Value)[] members =
        [
            ("scope", rest.Scope), ("metric", rest.Metric), ("level", rest.Level), ("days", rest.Days), ("amount", rest.Amount),
            ("every", rest.Every), ("probability", rest.Probability),
        ];
        foreach (var (member, value) in members)
            Unknown(place, member, value, $"it does not belong to {rest.Type}");
    }

    private void Unknown(Place place, string member, object? value, string why)
    {
        if (value is not null)
            reading.Refuse(place, member, FaultCodes.MemberUnknown, $"'{member}' must be left out: {why}.");
    }

    private string Scope(WantedEventJson sent, Place place, string metric)
    {
        if (sent.Scope is null)
            return Model.Documents.Scope.Portfolio.ToString();
        var scope = Model.Documents.Scope.Parse(sent.Scope);
        if (scope is null)
        {
            reading.Refuse(
                place, "scope", SubscriptionCodes.ScopeFormat, "'scope' must be portfolio, programme/p, project/p or milestone/p/a.");
        }
        else if (scope.Kind == ScopeKind.Milestone && metric != Metrics.Finish)
        {
            reading.Refuse(
                place, "metric", SubscriptionCodes.MilestoneWithoutCost, "A milestone has no cost: its 'metric' can only be finish.");
        }
        return sent.Scope;
    }

    private decimal KeptLevel(WantedEventJson sent, Place place)
    {
        if (sent.Level is not { } percent)
            return LevelParameter.Usual.Percent;
        if (!Level.TryOf(percent, out var level))
        {
            reading.Refuse(
                place, "level", SubscriptionCodes.OutOfRange, "'level' must be above 0 and below 100 with at most six decimals.");
        }
        else if (!kept.Contains(level))
        {
            reading.Refuse(
                place, "level", SubscriptionCodes.LevelNotKept,
                "'level' must be one that runs keep: 0.5, 1 to 99, 99.5 and those of 'confidence' in the settings.");
        }
        return percent;
    }

    private void Days(WantedEventJson sent, Place place, bool whole)
    {
        if (sent.Days is not { } days)
            reading.Missing(place, "days");
        else if (days is not (> 0 and <= MostDays))
            reading.Refuse(place, "days", SubscriptionCodes.OutOfRange, $"'days' must be above 0 and at most {MostDays}.");
        else if (whole && decimal.Truncate(days) != days)
            reading.Refuse(place, "days", FaultCodes.NumberNotWhole, "'days' must be a whole number.");
    }

    private void Amount(WantedEventJson sent, Place place)
    {
        if (sent.Amount is not { } amount)
            reading.Missing(place, "amount");
        else if (amount is not (> 0 and <= 1_000_000_000_000_000m))
            reading.Refuse(place, "amount", SubscriptionCodes.OutOfRange, "'amount' must be above 0 and at most 10¹⁵.");
    }

    private string Word(Place place, string member, string? text, string usual, IReadOnlyList<string> words)
    {
        if (text is not null && !words.Contains(text, StringComparer.Ordinal))
            reading.Refuse(place, member, FaultCodes.ValueUnknown, $"'{member}' must be one of {string.Join(", ", words)}.");
        return text ?? usual;
    }
}
