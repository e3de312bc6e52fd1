namespace Portfolio.Server.Results;

internal static class ResultsSetup
{
    /// <summary>What the read endpoints of results need.</summary>
    public static void AddResults(this IServiceCollection services)
    {
        services.AddSingleton<RunChoice>();
        services.AddSingleton<PortfolioFacts>();
        services.AddSingleton<ScopeMembers>();
        services.AddSingleton<ScopeIterations>();
        services.AddSingleton<RowLevels>();
        services.AddSingleton<ResultReading>();
        services.AddSingleton<OutcomesReading>();
        services.AddSingleton<ContingencyReading>();
        services.AddSingleton<SeriesReading>();
    }
}
