using Portfolio.Server.Http;
using Portfolio.Server.Idempotency;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Endpoints;

/// <summary>Every resource of the API, with what holds for all of them.</summary>
internal static class Api
{
    public static void MapApi(this WebApplication app)
    {
        var api = app.MapGroup("/v1").Refuses(400, 401, 406, 429, 503).RefusesOtherSites().HoldsToTexts().HoldsToMediaTypes().OnceOnly();
        api.MapPortfolios();
        api.MapKeys();
        api.MapAudit();

        var portfolio = api.MapGroup("/portfolios/{portfolio}").Refuses(403, 404);
        portfolio.MapPortfolio();
        portfolio.MapDocument();
        portfolio.MapSettings();
        portfolio.MapProjects();
        portfolio.MapActivities();
        portfolio.MapUpdates();
        portfolio.MapRevisions();
        portfolio.MapRuns();
        portfolio.MapSchedule();
        portfolio.MapResults();
        portfolio.MapDistribution();
        portfolio.MapSeries();
        portfolio.MapContingency();
        portfolio.MapCalendar();
        portfolio.MapEvents();
        portfolio.MapSubscriptions();
        portfolio.MapDeliveries();
    }
}
