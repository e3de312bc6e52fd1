using System.Globalization;
using System.Runtime.CompilerServices;
using System.Text.Json;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Runs;
using Portfolio.Store.Schedules;

namespace Portfolio.Server.Demo.Start;

/// <summary>
/// Posts the weeks of the demo as the office would have: one revision and one recorded run a week. What is there already is left alone.
/// </summary>
internal sealed class DemoPosting(
    DocumentStore documents, DocumentReader reader, DocumentCheck check, RunStore runs, RunRequests requests, ScheduleStore schedules)
{
    public const string Id = "harbour-water";

    private const string Nightly = "30 2 * * *";
    private const int AllRevisions = 1000;

    // What any server accepts that leaves its limits alone.
    private const int MaxDepth = 16;

    private static readonly Caller Office = Caller.System;

    /// <summary>
    /// The Sunday of the stored week 1; null when there is no portfolio yet. A history keeps its dates however often the demo is started
    /// later.
    /// </summary>
    /// <exception cref="InvalidOperationException">The portfolio of that name is somebody else's.</exception>
    public async Task<DateOnly?> FirstWeekAsync(CancellationToken cancellation)
    {
        if (await documents.ReadAsync(Office, Id, revision: 1, cancellation) is not { } first)
            return null;
        if (first.Revision.Note?.StartsWith(Mark(1), StringComparison.Ordinal) != true)
            throw new InvalidOperationException($"There is a portfolio '{Id}' that is not the demo. It is left as it is.");
        var project = first.Parts.First(part => part.Project != PartNames.Settings);
        var statusDate = DocumentReader.OfStored.ReadProject(project.Bytes).StatusDate!;
        return DateOnly.ParseExact(statusDate, "yyyy-MM-dd", CultureInfo.InvariantCulture);
    }

    /// <summary>The runs that stand for weeks of the history already, weeks in order.</summary>
    public Task<IReadOnlyList<StoredRun>> PointsAsync(DateOnly firstWeek, CancellationToken cancellation) => SundaysAsync(
        firstWeek, firstWeek.AddDays(7 * (DemoHistory.Length - 1)), cancellation);

    /// <summary>The run that stands for each week or is on its way to, as each is posted; weeks in order.</summary>
    public async IAsyncEnumerable<StoredRun> PostAsync(
        IReadOnlyList<DemoWeek> weeks, Action queued, [EnumeratorCancellation] CancellationToken cancellation)
    {
        var points = (await SundaysAsync(weeks[0].AsOf, weeks[^1].AsOf, cancellation)).ToDictionary(run => run.AsOf);
        var revisions = await RevisionsAsync(cancellation);
        foreach (var week in weeks)
        {
            if (!points.TryGetValue(week.AsOf, out var run))
            {
                var revision = revisions.TryGetValue(week.Number, out var stored) ? stored : await WriteAsync(week, cancellation);
                run = await QueueAsync(week, revision, cancellation);
                queued();
            }
            yield return run;
        }
        if (await schedules.FindAsync(Office, Id, cancellation) is null)
            await schedules.PutAsync(Office, Id, Nightly, iterations: null, enabled: false, joining: null, cancellation);
    }

    /// <summary>Points that are Sundays: somebody may have run days in between.</summary>
    private async Task<IReadOnlyList<StoredRun>> SundaysAsync(DateOnly first, DateOnly last, CancellationToken cancellation) =>
        [.. (await runs.ListPointsAsync(Office, Id, first, last, cancellation)).Where(run => run.AsOf.DayOfWeek == DayOfWeek.Sunday)];

    /// <summary>Revisions that an earlier start has posted, by week.</summary>
    private async Task<Dictionary<int, long>> RevisionsAsync(CancellationToken cancellation)
    {
        var stored = await documents.ListRevisionsAsync(Office, Id, before: null, AllRevisions, cancellation);
        return (from week in Enumerable.Range(1, DemoHistory.Length)
                let revision = stored.LastOrDefault(each => each.Note?.StartsWith(Mark(week), StringComparison.Ordinal) == true)
                where revision is not null
                select (week, revision.Number)).ToDictionary(each => each.week, each => each.Number);
    }

    private async Task<long> WriteAsync(DemoWeek week, CancellationToken cancellation)
    {
        var json = JsonSerializer.SerializeToUtf8Bytes(week.Document, DocumentContext.Strict(MaxDepth).DocumentJson);
        var submission = DocumentSubmission.Of(Id, json, reader, check);
        var write = new DocumentWrite { Portfolio = Id, Note = Mark(week.Number) + week.Note, Action = "document.put" };
        var result = await documents.WriteAsync(Office, write, (head, _) => submission.ReplaceAsync(head, Whatever(head)), cancellation);
        return result.Outcome is WriteOutcome.Accepted or WriteOutcome.Unchanged
            ? result.Revision
            : throw new InvalidOperationException($"Week {week.Number} of the demo was not taken: {result.Outcome}.");
    }

    private async Task<StoredRun> QueueAsync(DemoWeek week, long revision, CancellationToken cancellation)
    {
        var settings = week.Document.Settings!;
        var run = new NewRun
        {
            Portfolio = Id,
            AsOf = week.AsOf,
            // The demo leaves its time zone at UTC.
            DateEndsAt = new DateTimeOffset(week.AsOf.AddDays(1), TimeOnly.MinValue, TimeSpan.Zero),
            Revision = revision,
            Seed = (long)settings.Seed!.Value,
            Iterations = (int)settings.Iterations!.Value,
            Recorded = true,
        };
        var result = await requests.CreateAsync(Office, run, joining: null, cancellation);
        // A date that is held has a run of an earlier start on its way.
        return result is { Outcome: RunRequestOutcome.Created or RunRequestOutcome.DateHeld, Run: { } made }
            ? made
            : throw new InvalidOperationException($"The run of week {week.Number} of the demo was not taken: {result.Outcome}.");
    }

    private static string Mark(int week) => $"Week {week} of {DemoHistory.Length}: ";

    /// <summary>As a client says it that replaces the document whatever is there.</summary>
    private static Preconditions Whatever(Head? head)
    {
        var request = new DefaultHttpContext().Request;
        if (head is not null)
            request.Headers.IfMatch = "*";
        return new Preconditions(request);
    }
}
