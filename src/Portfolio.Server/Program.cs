using Portfolio.Server.Access;
using Portfolio.Server.Audit;
using Portfolio.Server.Demo.Start;
using Portfolio.Server.Documents;
using Portfolio.Server.Endpoints;
using Portfolio.Server.Events;
using Portfolio.Server.Hosting;
using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Jobs;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Server.Runs;
using Portfolio.Server.Telemetry;

if (VerifyAudit.IsAsked(args))
    return await VerifyAudit.RunAsync(args, Console.Out, Console.Error);

var builder = WebApplication.CreateBuilder(args);
#pragma warning disable RS0030 // The one place where the system's clock comes in.
builder.Services.AddSingleton(TimeProvider.System);
#pragma warning restore RS0030
builder.Logging.AddJsonLogs();
builder.AddWebServer();
builder.Services.AddPortfolioOptions();
builder.Services.AddStorage();
builder.Services.AddAccess();
builder.Services.AddProblems();
builder.Services.AddTimeLimits();
builder.Services.AddIdempotency();
builder.Services.AddDocuments();
builder.Services.AddResults();
builder.Services.AddRuns();
builder.Services.AddHealth();
builder.Services.AddTelemetry(builder.Configuration);
builder.Services.AddJobs(builder.Configuration);
builder.Services.AddEvents(builder.Configuration);
builder.Services.AddDemo(args);
builder.Services.AddApiDescription();
builder.Services.AddReference();
builder.RestWhenDescribing();

if (builder.BuildOrSayWhyNot() is not { } app)
    return Starting.CannotStart;
app.UseHeads();
app.UseProblems();
app.UseRouting();
app.UseRequestTimeouts();
app.UseAccess();
app.MapHealth();
app.MapApiDescription();
app.MapReference();
app.MapApi();

return await app.RunToEndAsync();
