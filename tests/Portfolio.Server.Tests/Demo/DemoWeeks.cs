using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Demo;

namespace Portfolio.Server.Tests.Demo;

/// <summary>The demo's weeks as its tests look at them.</summary>
internal static class DemoWeeks
{
    public static PortfolioDocument Model(DemoWeek week)
    {
        var reading = new Reading();
        var model = week.Document.ToModel(reading);
        Assert.Empty(reading.Faults);
        return model;
    }

    /// <summary>Canonical bytes of the parts as text, by project; "" for the settings.</summary>
    public static Dictionary<string, string> Parts(DemoWeek week)
    {
        var parts = week.Document.Projects!
            .ToDictionary(project => project.Id!, project => Convert.ToBase64String(DocumentReader.Bytes(project)));
        parts.Add("", Convert.ToBase64String(DocumentReader.Bytes(week.Document.Settings!)));
        return parts;
    }
}
