using System.Text.Json;
using Microsoft.Extensions.Options;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Runs;
using Portfolio.Server.Documents;
using Portfolio.Server.Hosting;
using Portfolio.Server.Jobs;
using Portfolio.Server.Problems;
using Portfolio.Store;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Runs;

/// <summary>Takes requests for runs: settles them, writes the row and asks for a wake-up. Nothing is simulated here.</summary>
internal sealed class RunIntake(
    DocumentStore documents, RevisionOfDate dates, RunRequests requests, RunSignal signal, TimeProvider clock,
    IOptions<LimitOptions> limits)
{
    /// <param name="joining">For rows that stand or fall with the request; null for none.</param>
    /// <exception cref="RequestRefused">The run is not taken.</exception>
    public async Task<StoredRun> TakeAsync(
        Caller caller, string portfolio, RunRequestJson asked, Func<StoreTransaction, StoredRun, CancellationToken, Task>? joining,
        CancellationToken cancellation)
    {
        var revision = await RevisionAsync(caller, portfolio, asked.Revision, cancellation);
        var zone = await dates.ZoneAsync(portfolio, cancellation);
        var part = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, revision, cancellation)
            ?? throw new RequestRefused(Problem.NotFound());
        var settings = DocumentReader.OfStored.ReadSettings(part.Bytes).ToModel(new Reading(), "/settings");
        var order = new RunOrder(settings, zone, clock.GetUtcNow(), limits.Value.Iterations);
        var run = order.Of(portfolio, revision, asked) with { MostQueued = limits.Value.QueuedRuns };
        if (order.Faults.Count > 0)
            throw new RequestRefused(Problem.Refused(order.Faults));
        if (!await HasActivitiesAsync(portfolio, revision, cancellation))
            throw Refused("", RunFaultCodes.NothingToRun, $"Revision {revision} holds no activity whose finish could be forecast.");
        var result = await requests.CreateAsync(caller, run, joining, cancellation);
        if (result is not { Outcome: RunRequestOutcome.Created, Run: { } made })
            throw new RequestRefused(Why(result, run));
        signal.Give();
        return made;
    }

    private async Task<long> RevisionAsync(Caller caller, string portfolio, double? asked, CancellationToken cancellation)
    {
        var newest = await documents.FindRevisionAsync(caller, portfolio, null, cancellation)
            ?? throw new RequestRefused(Problem.NotFound());
        if (asked is not { } number)
            return newest.Number;
        if (number >= 1 && number <= newest.Number && number == Math.Truncate(number))
            return (long)number;
        throw Refused("/revision", RunFaultCodes.RevisionUnknown, $"There is no such revision; the newest is {newest.Number}.");
    }

    /// <summary>Looks for the first activity without reading the document whole: nearly always it stands in the first project.</summary>
    private async Task<bool> HasActivitiesAsync(string portfolio, long revision, CancellationToken cancellation)
    {
        foreach (var head in await documents.ReadHeadsAsync(Caller.System, portfolio, revision, cancellation) ?? [])
        {
            if (head.Project != PartNames.Settings
                && await documents.ReadPartAsync(Caller.System, portfolio, head.Project, revision, cancellation) is { } part
                && HoldsActivity(part.Bytes))
                return true;
        }
        return false;
    }

    private static bool HoldsActivity(byte[] project)
    {
        var json = new Utf8JsonReader(project);
        while (json.Read())
        {
            if (json.TokenType != JsonTokenType.PropertyName || json.CurrentDepth != 1)
                continue;
            var activities = json.ValueTextEquals("activities"u8);
            json.Read();
            if (activities)
                return json.TokenType == JsonTokenType.StartArray && json.Read() && json.TokenType == JsonTokenType.StartObject;
            json.Skip();
        }
        return false;
    }

    private static Problem Why(RunRequestResult result, NewRun run) => result.Outcome switch
    {
        RunRequestOutcome.Forbidden => Problem.Forbidden(),
        RunRequestOutcome.Archived => Problem.Archived(),
        RunRequestOutcome.QueueFull => new Problem(
            429, "queue-full", "Too many runs wait",
            $"{run.MostQueued} runs of this portfolio are queued. Ask again after the time in Retry-After, or stop one of them."),
        RunRequestOutcome.DateHeld => Problem.Conflict(
            "date-closed", "The date is closed",
            $"{run.AsOf:yyyy-MM-dd} has ended, and run {result.Run?.Id} stands or will stand for it; "
            + "'replaces' puts another in its place."),
        RunRequestOutcome.ReplacesNotThePoint => Problem.Conflict(
            "not-the-point", "The run does not stand for its date",
            result.Run is { } point
                ? $"For {run.AsOf:yyyy-MM-dd} stands run {point.Id}."
                : $"No run stands for {run.AsOf:yyyy-MM-dd} yet."),
        RunRequestOutcome.ReplacesUnknown => Problem.Refused(
        [
            new Fault(
                "/replaces", "run", RunFaultCodes.ReplacesUnknown,
                "'replaces' must name a recorded run of the same date, and the new run must be recorded too."),
        ]),
        _ => Problem.NotFound(),
    };

    private static RequestRefused Refused(string path, string code, string message) =>
        new(Problem.Refused([new Fault(path, "run", code, message)]));
}
