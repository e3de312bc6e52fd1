using Portfolio.Server.Schedules;

namespace Portfolio.Server.Runs;

internal static class RunsSetup
{
    /// <summary>What the endpoints of runs and schedules need.</summary>
    public static void AddRuns(this IServiceCollection services)
    {
        services.AddSingleton<RunIntake>();
        services.AddSingleton<RunView>();
        services.AddSingleton<RunStream>();
        services.AddSingleton<ScheduleStanding>();
    }
}
