using Portfolio.Store.Postgres;

namespace Portfolio.Server.Hosting;

/// <summary>Binds every options class to its section and has it checked before the server starts.</summary>
internal static class OptionsSetup
{
    public static void AddPortfolioOptions(this IServiceCollection services)
    {
        services.AddOptions<StorageOptions>().BindConfiguration(StorageOptions.Section).ValidateDataAnnotations()
            .Validate(
                storage => storage.Postgres is null || PostgresDatabase.IsConnectionString(storage.Postgres),
                "Storage:Postgres is no connection string (Host=…;Username=…;Password=…;Database=…).")
            .ValidateOnStart();
        services.AddOptions<SecurityOptions>().BindConfiguration(SecurityOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<OidcOptions>().BindConfiguration(OidcOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<LimitOptions>().BindConfiguration(LimitOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<RoleOptions>().BindConfiguration("").ValidateDataAnnotations().ValidateOnStart();
    }
}
