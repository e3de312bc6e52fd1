using Microsoft.Extensions.DependencyInjection;
using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;
using Portfolio.Server.Tests.Subscriptions;
using Portfolio.Store.Access;

namespace Portfolio.Server.Tests.Rights;

/// <summary>
/// A server with two portfolios, <c>mine</c> and <c>yours</c>. Each has a project <c>seen</c> and one whose every name carries a mark, so
/// that wherever it leaks out it is recognised.
/// </summary>
public sealed class TwoPortfolios : IAsyncLifetime
{
    public const string MarkOfMine = "kingfisher";
    public const string MarkOfYours = "cormorant";

    public PortfolioServer Server { get; } = new(
        null, ("Limits:RequestsPerSecond", "100000"), ("Webhooks:AllowedHosts", "localhost"));

    public HttpClient Admin => field ??= Server.Client();

    internal DescribedApi Api { get; private set; } = null!;

    /// <summary>Parameters of addresses that name things of <c>mine</c>, and of <c>yours</c>.</summary>
    internal Dictionary<string, string> Mine { get; private set; } = [];

    internal Dictionary<string, string> Yours { get; private set; } = [];

    public async ValueTask InitializeAsync()
    {
        Api = await Server.ApiAsync();
        Mine = await MakeAsync("mine", MarkOfMine);
        Yours = await MakeAsync("yours", MarkOfYours);
    }

    public ValueTask DisposeAsync() => Server.DisposeAsync();

    public Task<HttpClient> KeyAsync(Right right, string portfolio, params string[] projects) =>
        Server.ClientAsync(new Grant(right, portfolio, projects.Length > 0 ? projects : null));

    private async Task<Dictionary<string, string>> MakeAsync(string portfolio, string mark)
    {
        Assert.True((await Admin.PutJsonAsync($"/v1/portfolios/{portfolio}/document", Document(mark))).IsSuccessStatusCode);
        Assert.True((await Admin.PutJsonAsync($"/v1/portfolios/{portfolio}/schedule", """{"cron":"30 4 * * *"}""")).IsSuccessStatusCode);
        var key = await Server.Services.GetRequiredService<KeyStore>().CreateAsync(
            Caller.System, mark, [new Grant(Right.Read, portfolio)], expiresAt: null, TestContext.Current.CancellationToken);
        var subscriptions = $"/v1/portfolios/{portfolio}/subscriptions";
        var wanted = $$"""{"id":"office","url":"http://localhost:1/{{mark}}","events":[{"type":"run.succeeded"}]}""";
        Assert.True((await Admin.PostJsonAsync(subscriptions, wanted)).IsSuccessStatusCode);
        var run = await Admin.SucceedAsync(portfolio, """{"iterations":10,"recorded":true}""");
        var deliveries = await SubscriptionScene.UntilAsync(
            () => Admin.ItemsAsync(subscriptions + "/office/deliveries"), found => found.Count > 0);
        return PathNames.Of(portfolio, run.Text("id"), deliveries[0].Text("id")).With("key", key!.Key.Id);
    }

    private static string Document(string mark) => $$$"""
        {"settings":{"name":"Works of the {{{mark}}}","currency":"EUR","iterations":10,
           "commitments":{"finish":"2028-12-31","budget":900000,"programmes":{"programme-{{{mark}}}":{"finish":"2028-06-30"} } } },
         "projects":[
          {"id":"seen","name":"Lock","programme":"seen-programme","statusDate":"2027-01-04","activities":[
            {"id":"A","duration":{"type":"uniform","low":5,"high":9},"cost":{"fixed":1000}},
            {"id":"M","milestone":true,"predecessors":["A"]}]},
          {"id":"hidden-{{{mark}}}","name":"Quay of the {{{mark}}}","programme":"programme-{{{mark}}}","tags":{"of":"{{{mark}}}"},
           "statusDate":"2026-01-04","commitments":{"finish":"2027-03-31","budget":5000},"activities":[
            {"id":"A-{{{mark}}}","name":"Piles of the {{{mark}}}","duration":{"type":"uniform","low":5,"high":9},"cost":{"fixed":2000}},
            {"id":"M","milestone":true,"predecessors":["A-{{{mark}}}"]}],
           "riskEvents":[{"id":"E-{{{mark}}}","name":"Storm","probability":0.2,"impacts":[{"cost":50}]}]}]}
        """;
}
