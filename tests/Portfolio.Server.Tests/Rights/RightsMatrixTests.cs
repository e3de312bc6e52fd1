using System.Text;
using System.Text.Json.Nodes;
using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Rights;

/// <summary>Every operation of the description asked by every kind of key: who reaches what, and that refusals give nothing away.</summary>
public sealed class RightsMatrixTests(TwoPortfolios scene) : IClassFixture<TwoPortfolios>
{
    // Deletions last: what they take away is asked for before.
    private IEnumerable<DescribedOperation> Operations => scene.Api.Operations.OrderBy(operation => operation.Method == "DELETE");

    private static CancellationToken Cancellation => TestContext.Current.CancellationToken;

    [Fact]
    public async Task EveryReadNamesSomethingThatIsThere()
    {
        // Otherwise the answers to the other keys would prove nothing.
        var flaws = new List<string>();
        foreach (var operation in Operations.Where(operation => operation.Method == "GET"))
            if (await AskAsync(scene.Admin, operation, scene.Mine) is { Status: not 200 } answer)
                flaws.Add($"{operation.Name} answers {answer.Status} to the administrator: {nameof(TwoPortfolios)} must hold what it asks for. {answer.Text}");
        Assert.True(flaws.Count == 0, string.Join(Environment.NewLine, flaws));
    }

    [Fact]
    public async Task WithoutAValidKeyEverythingIs401()
    {
        var keys = scene.Server.Services.GetRequiredService<KeyStore>();
        var everything = new[] { new Grant(Right.Admin, Grant.Everywhere) };
        var expired = await keys.CreateAsync(Caller.System, "expired", everything, scene.Server.Clock.GetUtcNow().AddSeconds(1), Cancellation);
        var revoked = await keys.CreateAsync(Caller.System, "revoked", everything, expiresAt: null, Cancellation);
        await keys.RevokeAsync(Caller.System, revoked!.Key.Id, null, Cancellation);
        scene.Server.Clock.Advance(TimeSpan.FromSeconds(2));
        string?[] headers =
        [
            null, "Bearer", "Bearer wrong", $"Bearer {new string('k', 600)}", "Basic !!!", "Digest " + PortfolioServer.AdminKey, PortfolioServer.AdminKey,
            "Bearer " + expired!.Secret, "Bearer " + revoked.Secret, "Basic " + Convert.ToBase64String(Encoding.UTF8.GetBytes(":" + expired.Secret)),
        ];
        foreach (var header in headers)
        {
            var client = scene.Server.Client(key: null);
            if (header is not null)
                client.DefaultRequestHeaders.TryAddWithoutValidation("Authorization", header);
            // That WWW-Authenticate comes with it is part of the description.
            await EachAsync(client, scene.Mine, (operation, answer) => answer.Status == 401 ? null : "not 401");
        }
    }

    [Theory]
    [InlineData(Right.Read)]
    [InlineData(Right.Submit)]
    [InlineData(Right.Manage)]
    [InlineData(Right.Finance)]
    [InlineData(Right.Admin)]
    public async Task ARightOpensTheOperationsThatNameIt(Right right)
    {
        var onMine = await scene.KeyAsync(right, "mine");
        var everywhere = await scene.KeyAsync(right, Grant.Everywhere);
        var flaws = new List<string>();
        foreach (var operation in Operations)
        {
            var answer = await AskAsync(operation.Template.Contains("{portfolio}", StringComparison.Ordinal) ? onMine : everywhere, operation, scene.Mine);
            var opened = operation.Rights is not { } rights || rights.Contains(right.ToString().ToLowerInvariant());
            if (!opened && answer.Status != 403)
                flaws.Add($"{operation.Name} answers {answer.Status}, though only {string.Join(", ", operation.Rights!)} open it.");
            if (opened && (answer.IsRefusal || (answer.Status == 404 && (await AskAsync(scene.Admin, operation, scene.Mine)).Status != 404)))
                flaws.Add($"{operation.Name} answers {answer.Status}, though it says that {right} opens it. {answer.Text}");
        }
        Assert.True(flaws.Count == 0, string.Join(Environment.NewLine, flaws));
    }

    [Theory]
    [InlineData(Right.Read)]
    [InlineData(Right.Submit)]
    [InlineData(Right.Manage)]
    [InlineData(Right.Finance)]
    [InlineData(Right.Admin)]
    public async Task AForeignPortfolioIsAsIfItWereNotThere(Right right)
    {
        var stranger = await scene.KeyAsync(right, "mine");
        var nowhere = scene.Yours.With("portfolio", "never-made");
        await EachAsync(stranger, scene.Yours, (operation, answer) => answer.Mentions(TwoPortfolios.MarkOfYours) ? "mentions what is hidden" : null);
        foreach (var operation in Operations.Where(operation => operation.Template.Contains("{portfolio}", StringComparison.Ordinal)))
        {
            var (foreign, absent) = (await AskAsync(stranger, operation, scene.Yours), await AskAsync(stranger, operation, nowhere));
            Assert.True(foreign.Status == 404, $"{operation.Name} answers {foreign.Status} to a key of another portfolio.");
            Assert.Equal((absent.Status, absent.WithoutTrace()), (foreign.Status, foreign.WithoutTrace()));
        }
    }

    [Theory]
    [InlineData(Right.Read)]
    [InlineData(Right.Submit)]
    [InlineData(Right.Manage)]
    public async Task AKeyOfOneProjectSeesAndChangesNoOther(Right right)
    {
        var limited = await scene.KeyAsync(right, "mine", "seen");
        var before = await HiddenAsync();
        foreach (var project in new[] { "seen", "hidden-" + TwoPortfolios.MarkOfMine })
        {
            var names = scene.Mine.With("project", project).With("programme", "programme-" + TwoPortfolios.MarkOfMine);
            await EachAsync(limited, names, (operation, answer) => answer.Mentions(TwoPortfolios.MarkOfMine) ? "mentions what is hidden" : null);
        }
        Assert.Equal(before, await HiddenAsync());
    }

    private async Task<string> HiddenAsync() =>
        (await (await scene.Admin.ReadAsync("/v1/portfolios/mine/document")).JsonAsync()).GetProperty("projects")[1].ToString();

    private async Task EachAsync(HttpClient client, Dictionary<string, string> names, Func<DescribedOperation, Answer, string?> judge)
    {
        var flaws = new List<string>();
        foreach (var operation in Operations)
        {
            var answer = await AskAsync(client, operation, names);
            if (judge(operation, answer) is { } flaw)
                flaws.Add($"{operation.Name} answers {answer.Status}: {flaw}. {answer.Text}");
        }
        Assert.True(flaws.Count == 0, string.Join(Environment.NewLine, flaws));
    }

    private async Task<Answer> AskAsync(HttpClient client, DescribedOperation operation, Dictionary<string, string> names)
    {
        using var response = await client.SendAsync(new RequestSamples(scene.Api, names).Of(operation), Cancellation);
        return new((int)response.StatusCode, $"{response.Headers}{response.Content.Headers}", await response.TextAsync());
    }

    private sealed record Answer(int Status, string Headers, string Text)
    {
        public bool Mentions(string mark) => Text.Contains(mark, StringComparison.Ordinal) || Headers.Contains(mark, StringComparison.Ordinal);

        /// <summary>Refused as a whole; a refusal that names single members of the body lets others be written.</summary>
        public bool IsRefusal => Status == 401 || (Status == 403 && !Text.Contains("\"right.missing\"", StringComparison.Ordinal));

        public string WithoutTrace()
        {
            var problem = JsonNode.Parse(Text)!.AsObject();
            problem.Remove("traceId");
            return problem.ToJsonString();
        }
    }
}
