using System.Globalization;
using System.Text;

namespace Portfolio.Server.Tests.Runs;

/// <summary>Documents to simulate.</summary>
internal static class RunSamples
{
    /// <summary>Projects of uncertain activities, one behind the other, with cost and a milestone at the end.</summary>
    public static string Uncertain(int projects = 2, int activities = 3, string timeZone = "UTC")
    {
        var json = new StringBuilder();
        json.Append(CultureInfo.InvariantCulture, $$"""{"settings":{"name":"Harbour","currency":"EUR","timeZone":"{{timeZone}}"},"projects":[""");
        for (var p = 0; p < projects; p++)
        {
            json.Append(CultureInfo.InvariantCulture, $$"""{{(p > 0 ? "," : "")}}{"id":"P{{p}}","statusDate":"2027-01-04","activities":[""");
            for (var a = 0; a < activities; a++)
            {
                var before = a == 0 ? "" : string.Create(CultureInfo.InvariantCulture, $"\"A{a - 1}\"");
                json.Append(CultureInfo.InvariantCulture, $$"""{"id":"A{{a}}","duration":{"type":"pert","low":3,"mode":{{5 + (a + p) % 4}},"high":20},"cost":{"perDay":{{100 + a}}},"predecessors":[{{before}}]},""");
            }
            json.Append(CultureInfo.InvariantCulture, $$"""{"id":"M","milestone":true,"predecessors":["A{{activities - 1}}"]}]}""");
        }
        return json.Append("]}").ToString();
    }
}
