namespace Portfolio.Server.Hosting;

/// <summary>Binds every options class to its section and has it checked before the server starts.</summary>
internal static class OptionsSetup
{
    public static void AddPortfolioOptions(this IServiceCollection services)
    {
        services.AddOptions<StorageOptions>().BindConfiguration(StorageOptions.Section).ValidateDataAnnotations()
            .Validate(storage => string.IsNullOrEmpty(storage.Postgres), "Storage:Postgres is not served yet; leave it out.")
            .ValidateOnStart();
        services.AddOptions<SecurityOptions>().BindConfiguration(SecurityOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<LimitOptions>().BindConfiguration(LimitOptions.Section).ValidateDataAnnotations().ValidateOnStart();
        services.AddOptions<RoleOptions>().BindConfiguration("").ValidateDataAnnotations().ValidateOnStart();
    }
}
