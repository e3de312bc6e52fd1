using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Demo.Programmes;

/// <summary>All projects of the demo with their risks, in document order.</summary>
internal static class Catalogue
{
    /// <param name="dateOfWeek">The Sunday of a week counted from the first of the history, as text.</param>
    public static IEnumerable<ProjectJson> Projects(Func<int, string> dateOfWeek) =>
        from programme in new[]
        {
            (Id: "waterways", Waterways.Projects), (Id: "harbour", Harbour.Projects),
            (Id: "flood-protection", FloodProtection.Projects), (Id: "water-and-sewage", WaterAndSewage.Projects),
        }
        from plan in programme.Projects
        select plan.ToProject(programme.Id, dateOfWeek) with { RiskEvents = RiskRegister.OfProjects[plan.Id] };
}
