using System.Text;
using Portfolio.Model.Rules;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Documents;

namespace Portfolio.Server.Tests.Contracts;

/// <summary>What can be read as JSON but says something unreadable: every such place is a fault, none hides another.</summary>
public sealed class ShapeFaultTests
{
    private static readonly DocumentReader Reader = new(16);

    [Theory]
    [InlineData("""{"type":"gamma","shape":2}""", "/type", "type.unknown")]
    [InlineData("""{"low":1,"high":2}""", "", "member.missing")]
    [InlineData("""{"type":7,"low":1}""", "/type", "member.kind")]
    [InlineData("""{"type":"uniform","low":1}""", "", "member.missing")]
    [InlineData("""{"type":"uniform","low":1,"high":2,"mode":1}""", "/mode", "member.unknown")]
    [InlineData("""{"type":"uniform","low":1,"high":2,"a/b":1}""", "/a~1b", "member.unknown")]
    [InlineData("""{"type":"uniform","low":"1","high":2}""", "/low", "member.kind")]
    [InlineData("""{"high":2,"low":1e999,"type":"uniform"}""", "/low", "number.not-finite")]
    [InlineData("""{"type":"lognormal","mean":1,"sd":2,"low":1}""", "/low", "member.unknown")]
    [InlineData("""{"type":"discrete"}""", "", "member.missing")]
    [InlineData("""{"type":"discrete","outcomes":5}""", "/outcomes", "member.kind")]
    [InlineData("""{"type":"discrete","outcomes":[{"value":1}]}""", "/outcomes/0", "member.missing")]
    [InlineData("""{"type":"discrete","outcomes":[3]}""", "/outcomes/0", "member.kind")]
    [InlineData("""{"type":"discrete","outcomes":[{"value":1,"probability":1,"p":0}]}""", "/outcomes/0/p", "member.unknown")]
    [InlineData("""{"type":"percentiles","points":[{"p":0,"value":[1]}]}""", "/points/0/value", "member.kind")]
    [InlineData("""{"type":"percentiles","points":[],"outcomes":[]}""", "/outcomes", "member.unknown")]
    [InlineData("1e999", "", "number.not-finite")]
    public void InADistribution(string duration, string path, string code) =>
        Single($$"""{"id":"p","statusDate":"2027-01-04","activities":[{"id":"A","duration":{{duration}}}]}""", "/activities/0/duration" + path, "p/A", code);

    [Theory]
    [InlineData("""{"activity":"B","type":"FX"}""", "/type", "type.unknown")]
    [InlineData("""{"type":"FS"}""", "", "member.missing")]
    [InlineData("""{"activity":""}""", "", "member.missing")]
    [InlineData("\"\"", "", "member.missing")]
    [InlineData("""{"activity":5}""", "/activity", "member.kind")]
    [InlineData("""{"activity":"B","lag":"2"}""", "/lag", "member.kind")]
    [InlineData("""{"activity":"B","delay":2}""", "/delay", "member.unknown")]
    [InlineData("""{"activity":"B","lag":-1e999}""", "/lag", "number.not-finite")]
    public void InALink(string link, string path, string code) =>
        Single($$"""{"id":"p","statusDate":"2027-01-04","activities":[{"id":"A","predecessors":[{{link}}]}]}""", "/activities/0/predecessors/0" + path, "p/A", code);

    [Theory]
    [InlineData("""{"statusDate":"2027-01-04"}""", "", "member.missing")]
    [InlineData("""{"id":"p"}""", "", "member.missing")]
    [InlineData("""{"id":"","statusDate":"2027-01-04"}""", "", "member.missing")]
    [InlineData("""{"id":"p","statusDate":"2027-02-29"}""", "/statusDate", "date.format")]
    [InlineData("""{"id":"p","statusDate":"0001-01-01"}""", "/statusDate", "date.format")]
    [InlineData("""{"id":"p","statusDate":"2027-01-04","priority":1.5}""", "/priority", "number.not-whole")]
    [InlineData("""{"id":"p","statusDate":"2027-01-04","correlation":1e999}""", "/correlation", "number.not-finite")]
    [InlineData("""{"id":"p","statusDate":"2027-01-04","overhead":{"actual":1e999}}""", "/overhead/actual", "number.not-finite")]
    [InlineData("""{"id":"p","statusDate":"2027-01-04","currency":"USD"}""", "/currency", "member.reserved")]
    public void InAProject(string project, string path, string code) => Single(project, path, null, code);

    [Fact]
    public void PointersOfEveryFaultLeadSomewhere()
    {
        var json = """
            {"settings":{"weekEnds":"Sunday","poolRule":"x","calendars":[{"id":"c","workingWeekdays":["mo"]}],"fiscalYearStart":"13-01"},
             "projects":[{"id":"p","statusDate":"soon","riskEvents":[{"id":"e","impacts":[{"delay":{"type":"discrete","outcomes":[{}]}}]}]}]}
            """;
        new DocumentCheck(ModelLimits.Default).Check(Reader.ReadDocument(Encoding.UTF8.GetBytes(json)), Encoding.UTF8.GetBytes(json), out var faults);
        string[] first = ["/settings", "/settings", "/settings/weekEnds", "/settings/poolRule", "/settings/calendars/0/workingWeekdays/0"];
        Assert.Equal(first, faults.Select(fault => fault.Path).Take(5));
        Assert.Contains(faults, fault => fault.Path == "/projects/0/riskEvents/0/impacts/0/delay/outcomes/0");
    }

    private static void Single(string project, string path, string? subject, string code)
    {
        var reading = new Reading();
        Reader.ReadProject(Encoding.UTF8.GetBytes(project)).ToModel(reading, "");
        var fault = Assert.Single(reading.Faults);
        Assert.Equal((path, code), (fault.Path, fault.Code));
        if (subject is not null)
            Assert.Equal(subject, fault.Subject);
    }
}
