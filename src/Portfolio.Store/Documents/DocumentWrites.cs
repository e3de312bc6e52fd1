using Portfolio.Store.Access;
using Portfolio.Store.Audit;
using Portfolio.Store.Outbox;

namespace Portfolio.Store.Documents;

/// <content>The one write path.</content>
public sealed partial class DocumentStore
{
    /// <summary>
    /// The one write path, one transaction: the head is read, <paramref name="decide"/> looks at it (null: the portfolio does not exist
    /// yet) and proposes, then revision, parts, audit entry and outbox row are written. When <paramref name="decide"/> throws, nothing is
    /// kept. It must not write to the store itself.
    /// </summary>
    public Task<WriteResult> WriteAsync(
        Caller caller, DocumentWrite write, Func<Head?, CancellationToken, Task<Proposal>> decide, CancellationToken cancellation) =>
        WriteAsync(caller, write, decide, ahead: null, cancellation);

    /// <summary>
    /// The same, decided ahead of the transaction, for which other writers need not wait; decided again inside only when another write
    /// came between. <paramref name="decide"/> must be safe to call twice.
    /// </summary>
    public async Task<WriteResult> WriteDecidedAheadAsync(
        Caller caller, DocumentWrite write, Func<Head?, CancellationToken, Task<Proposal>> decide, CancellationToken cancellation)
    {
        var ahead = await database.ReadAsync(
            async open =>
            {
                if (await TurnedAsync(open, caller, write) is (_, not null))
                    return null;
                var head = await Head.FindAsync(open, write.Portfolio);
                var proposal = await decide(head, cancellation);
                return new Ahead(head, head?.LookedBeyond == true ? null : proposal);
            },
            cancellation);
        return await WriteAsync(caller, write, decide, ahead, cancellation);
    }

    /// <summary>What a write would come to; nothing is kept, no audit entry either.</summary>
    public Task<WriteResult> TryAsync(
        Caller caller, DocumentWrite write, Func<Head?, CancellationToken, Task<Proposal>> decide, CancellationToken cancellation) =>
        database.ReadAsync(
            async open =>
            {
                var (standing, turned) = await TurnedAsync(open, caller, write);
                if (turned is { } outcome)
                    return new WriteResult(outcome);
                var head = await Head.FindAsync(open, write.Portfolio);
                var result = new WriteResult(WriteOutcome.Refused) { Revision = head?.Revision ?? 0 };
                var proposal = await decide(head, cancellation);
                if (proposal is Refusal refusal)
                    return result with { Refusal = refusal.Reason };
                var plan = PartPlan.Make(head?.Rows ?? [], (Change)proposal);
                if (!standing.Whole && !await ReachesAsync(open, caller, write, plan.Select(part => part.Project)))
                    return new WriteResult(WriteOutcome.Forbidden);
                return result with { Outcome = plan.Count > 0 ? WriteOutcome.Accepted : WriteOutcome.Unchanged };
            },
            cancellation);

    private sealed record Ahead(Head? Head, Proposal? Proposal);

    private async Task<WriteResult> WriteAsync(
        Caller caller, DocumentWrite write, Func<Head?, CancellationToken, Task<Proposal>> decide, Ahead? ahead,
        CancellationToken cancellation)
    {
        return await database.WriteAsync(
            async open =>
            {
                var (standing, turned) = await TurnedAsync(open, caller, write);
                if (turned is { } outcome)
                    return new WriteResult(outcome);
                var head = await Head.FindAsync(open, write.Portfolio, ahead?.Head);
                var proposal = ahead?.Head?.Revision == head?.Revision ? ahead?.Proposal : null;
                proposal ??= await decide(head, cancellation);
                if (proposal is Refusal refusal)
                    return new WriteResult(WriteOutcome.Refused) { Revision = head?.Revision ?? 0, Refusal = refusal.Reason };
                return await AcceptAsync(open, caller, write, standing, head, PartPlan.Make(head?.Rows ?? [], (Change)proposal));
            },
            cancellation);
    }

    private const string ExistsSql = "select count(*) from portfolio where id = @Portfolio";

    private static async Task<Right> RightNeededAsync(StoreTransaction open, DocumentWrite write) =>
        await open.FirstAsync<long>(ExistsSql, new { write.Portfolio }) > 0 ? write.Right : Right.Admin;

    /// <summary>Where the caller stands, and why it is turned away before anything is decided; null: it is not.</summary>
    private static async Task<(Standing Standing, WriteOutcome? Turned)> TurnedAsync(
        StoreTransaction open, Caller caller, DocumentWrite write)
    {
        var standing = await Standing.ReadAsync(open, caller, await RightNeededAsync(open, write), write.Portfolio);
        var turned = Turned(standing, write);
        return turned is null && !standing.Whole && !await ReachesAsync(open, caller, write, write.Parts)
            ? (standing, WriteOutcome.Forbidden)
            : (standing, turned);
    }

    private static WriteOutcome? Turned(Standing standing, DocumentWrite write) => standing switch
    {
        { Known: false } => WriteOutcome.NotFound,
        { Exists: false } when !write.MayCreate => WriteOutcome.NotFound,
        { Exists: true, Some: false } or { Exists: false, Whole: false } => WriteOutcome.Forbidden,
        { Archived: true } => WriteOutcome.Archived,
        _ => null,
    };

    private static async Task<WriteResult> AcceptAsync(
        StoreTransaction open, Caller caller, DocumentWrite write, Standing standing, Head? head, IReadOnlyList<PlannedPart> plan)
    {
        if (!standing.Whole && !await ReachesAsync(open, caller, write, plan.Select(part => part.Project)))
            return new WriteResult(WriteOutcome.Forbidden);
        var result = new WriteResult(WriteOutcome.Unchanged) { Revision = head?.Revision ?? 0 };
        if (plan.Count > 0)
        {
            result = new WriteResult(WriteOutcome.Accepted)
            {
                Revision = result.Revision + 1,
                Created = head is null,
                Changes = [.. plan.Select(part => new PartChange(part.Project, part.Before, part.After))],
            };
            await KeepAsync(open, caller, write, head, result.Revision, plan);
            await TellAsync(open, caller, write, result);
        }
        if (write.Joining is { } joining)
            await joining(open, result, open.Cancellation);
        return result;
    }

    private static string ReachesSql(Right right) => $"select case when {Granted.Part(right, "@Portfolio", "@Project")} then 1 else 0 end";

    /// <summary>Whether grants limited to projects cover every one of these parts.</summary>
    private static async Task<bool> ReachesAsync(StoreTransaction open, Caller caller, DocumentWrite write, IEnumerable<string> parts)
    {
        foreach (var project in parts)
        {
            var asked = new { Caller = caller.KeyId, open.Now, write.Portfolio, Project = project };
            if (await open.FirstAsync<long>(ReachesSql(write.Right), asked) == 0)
                return false;
        }
        return true;
    }

    private const string InsertPortfolioSql = "insert into portfolio (id, created_at) values (@Portfolio, @Now)";

    private const string InsertRevisionSql = """
        insert into revision (portfolio, number, recorded_at, actor, note) values (@Portfolio, @Number, @RecordedAt, @Actor, @Note)
        """;

    private const string SupersedeSql = """
        update revision_part set superseded = @Number
        where portfolio = @Portfolio and project = @Project and superseded = 9223372036854775807
        """;

    private const string InsertPartSql = """
        insert into revision_part (portfolio, revision, project, position, hash) values (@Portfolio, @Number, @Project, @Position, @After)
        """;

    private static async Task KeepAsync(
        StoreTransaction open, Caller caller, DocumentWrite write, Head? head, long number, IReadOnlyList<PlannedPart> plan)
    {
        if (head is null)
            await open.ExecuteAsync(InsertPortfolioSql, new { write.Portfolio, open.Now });
        // A clock set back must not make a later revision look older: "as of" would then find the wrong one.
        var recordedAt = Math.Max(open.Now, head?.RecordedAt ?? 0);
        await open.ExecuteAsync(
            InsertRevisionSql, new { write.Portfolio, Number = number, RecordedAt = recordedAt, Actor = caller.KeyId, write.Note });
        await PartContents.KeepAsync(open, from part in plan where part.After != part.Before select part.Proposed into sent
            where sent is not null select sent);
        if (head is not null)
            await open.ExecuteEachAsync(SupersedeSql, plan.Select(part => new { write.Portfolio, part.Project, Number = number }));
        await open.ExecuteEachAsync(
            InsertPartSql, plan.Select(part => new { write.Portfolio, Number = number, part.Project, part.Position, part.After }));
    }

    private static async Task TellAsync(StoreTransaction open, Caller caller, DocumentWrite write, WriteResult result)
    {
        var detail = new { outcome = "accepted", result.Revision, result.Changes, write.Note };
        await AuditChain.AppendAsync(open, caller.KeyId, write.Action, ObjectOf(write), detail);
        var payload = new { result.Revision, changed = result.Changes.Select(change => change.Project) };
        await OutboxStore.AppendAsync(open, write.Portfolio, "revision.created", $"{result.Revision}", payload);
    }

    private static string ObjectOf(DocumentWrite write) => write.Object ?? $"portfolios/{write.Portfolio}";
}
