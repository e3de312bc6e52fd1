namespace Portfolio.Server.Tests.Hosting;

/// <summary>Small documents that break no rule.</summary>
internal static class Samples
{
    /// <summary>One project of one activity; what is stored is these bytes.</summary>
    public static string Document(string name = "Harbour", double days = 5, string project = "weir") =>
        FormattableString.Invariant(
            $$"""{"settings":{"name":"{{name}}","currency":"EUR"},"projects":[{"id":"{{project}}","statusDate":"2027-01-04","activities":[{"id":"A","duration":{{days}}}]}]}""");
}
