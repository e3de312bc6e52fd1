using System.Globalization;
using Portfolio.Model.Faults;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Keys;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Place = Portfolio.Server.Contracts.Json.Place;

namespace Portfolio.Server.Access;

/// <summary>A key that was asked for, read and checked; the change is of use only when there are no faults.</summary>
internal sealed record KeyRequest(KeyChange Change, IReadOnlyList<Fault> Faults)
{
    private const int Most = 1_000;

    private static readonly Place Body = new("", "key");

    /// <param name="whole">A key to be made: name and grants are needed. Otherwise what is not sent stays.</param>
    public static KeyRequest Of(KeyRequestJson sent, bool whole, DateTimeOffset now)
    {
        var reading = new Reading();
        var change = new KeyChange
        {
            Name = whole || sent.HasName ? NameOf(reading, sent.Name) : null,
            Grants = whole || sent.HasGrants ? GrantsOf(reading, sent.Grants) : null,
            ChangesExpiry = sent.HasExpiresAt,
            ExpiresAt = ExpiryOf(reading, sent.ExpiresAt, now),
        };
        return new KeyRequest(change, reading.Faults);
    }

    private static string NameOf(Reading reading, string? name)
    {
        if (TextChecks.Name(reading.Required(Body, "name", name), "name", Body.Member("name"), Body.Subject) is { } fault)
            reading.Faults.Add(fault);
        return name!;
    }

    private static IReadOnlyList<Grant> GrantsOf(Reading reading, IReadOnlyList<GrantJson>? sent)
    {
        if (sent is null)
            reading.Missing(Body, "grants");
        else if (sent.Count == 0)
            reading.Refuse(Body, "grants", KeyFaultCodes.GrantsEmpty, "A key without any grant could do nothing; name at least one.");
        else if (sent.Count > Most)
            reading.Refuse(Body, "grants", RuleCodes.LimitExceeded, $"A key may have {Most} grants.");
        else
            return Distinct(reading, reading.List(Body, "grants", sent, (grant, at) => GrantOf(reading, grant, at)));
        return [];
    }

    /// <summary>Null when it cannot be told what is granted.</summary>
    private static Grant? GrantOf(Reading reading, GrantJson sent, Place at)
    {
        var word = reading.Required(at, "right", sent.Right);
        var right = reading.Word(at, "right", word is "" ? null : word, RightWords.All);
        var portfolio = reading.Required(at, "portfolio", sent.Portfolio) ?? "";
        if (portfolio is not ("" or Grant.Everywhere) && TextChecks.Id(portfolio, at.Member("portfolio"), at.Subject) is { } fault)
            reading.Faults.Add(fault);
        var only = sent.Projects is { } projects ? ProjectsOf(reading, projects, at) : null;
        return right is { } known && portfolio != "" ? new Grant(known, portfolio, only) : null;
    }

    private static IReadOnlyList<string> ProjectsOf(Reading reading, IReadOnlyList<string> sent, Place at)
    {
        if (sent.Count == 0)
            reading.Refuse(at, "projects", KeyFaultCodes.ProjectsEmpty, "An empty list reaches nothing; leave it out for the whole portfolio.");
        if (sent.Count > Most)
            reading.Refuse(at, "projects", RuleCodes.LimitExceeded, $"A grant may name {Most} projects.");
        var ids = reading.Texts(at, "projects", sent);
        reading.Faults.AddRange(
            ids.Select((id, i) => TextChecks.Id(id, $"{at.Member("projects")}/{i}", at.Subject)).OfType<Fault>());
        return ids;
    }

    private static IReadOnlyList<Grant> Distinct(Reading reading, IReadOnlyList<Grant?> grants)
    {
        var seen = new HashSet<(Right, string, bool)>();
        for (var i = 0; i < grants.Count; i++)
        {
            if (grants[i] is { } grant && !seen.Add((grant.Right, grant.Portfolio, grant.Projects is null)))
            {
                reading.Faults.Add(new Fault(
                    $"/grants/{i}", Body.Subject, KeyFaultCodes.GrantRepeated, "This right on this portfolio is granted by an earlier entry."));
            }
        }
        return [.. grants.OfType<Grant>()];
    }

    private static readonly string[] Instants = ["yyyy-MM-dd'T'HH:mm:ss'Z'", "yyyy-MM-dd'T'HH:mm:ss.FFFFFFF'Z'"];

    private static DateTimeOffset? ExpiryOf(Reading reading, string? sent, DateTimeOffset now)
    {
        if (sent is null)
            return null;
        if (!DateTimeOffset.TryParseExact(
            sent, Instants, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal, out var at))
        {
            reading.Refuse(
                Body, "expiresAt", KeyFaultCodes.InstantFormat, "'expiresAt' is not an instant of the form 2027-12-31T23:00:00Z.");
        }
        else if (at <= now)
        {
            reading.Refuse(Body, "expiresAt", KeyFaultCodes.ExpiryPast, "'expiresAt' has passed already; DELETE ends a key at once.");
        }
        return at;
    }

    private const double MostOverlapHours = 30 * 24;

    /// <exception cref="RequestRefused">The hours are out of range.</exception>
    public static TimeSpan OverlapOf(RotationJson? sent) => (sent?.OverlapHours ?? 24) is >= 0 and <= MostOverlapHours and var hours
        ? TimeSpan.FromHours(hours)
        : throw new RequestRefused(Problem.Refused(
        [
            new Fault(
                "/overlapHours", Body.Subject, KeyFaultCodes.OverlapRange, $"'overlapHours' must be from 0 to {MostOverlapHours}."),
        ]));
}
