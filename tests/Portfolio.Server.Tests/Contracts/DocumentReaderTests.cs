using System.Text;
using Portfolio.Model.Distributions;
using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Tests.Contracts;

public sealed class DocumentReaderTests
{
    private static readonly DocumentReader Reader = new(16);

    private const string Everything = """
        {"settings":{"name":"Harbour","currency":"EUR","timeZone":"UTC","weekEnds":"fri","fiscalYearStart":"04-01","confidence":[50,80],"seed":9007199254740991,"iterations":5000,"commitments":{"finish":"2028-03-31","budget":1000.50,"programmes":{"locks":{"finish":"2028-01-31"}}},"calendars":[{"id":"five","workingWeekdays":["mon","tue"],"nonWorkingDates":["2027-05-01"],"extraWorkingDates":[]}],"defaultCalendar":"five","pools":[{"id":"rig","name":"Piling rig","capacity":2,"capacityChanges":[{"from":"2027-06-01","capacity":1}]}],"poolRule":"inOrder","drivers":[{"id":"ground","probability":0.5,"durationFactor":{"type":"uniform","low":1,"high":1.5},"costFactor":1.1}],"dependence":{"betweenProjects":0.1,"withinProgramme":0.2,"pairs":[{"between":["driver/ground","project/weir"],"rank":0.3}],"repair":"nearest"},"riskEvents":[{"id":"storm","probability":0.1,"impacts":[{"activity":"weir/A","delay":5},{"project":"weir","cost":-10}],"responses":[{"id":"wait","cost":5.00,"taken":true,"project":"weir"}]}]},"projects":[{"id":"weir","name":"Wehr größer","programme":"locks","tags":{"a.b":"x"},"priority":3,"statusDate":"2027-01-04","calendar":"five","commitments":{"finish":"2028-01-01","budget":12.5},"correlation":0.3,"drivers":["ground"],"overhead":{"perDay":10.5,"actual":3},"activities":[{"id":"A","milestone":false,"duration":{"type":"pert","low":1,"mode":2,"high":4,"lowPercentile":10,"highPercentile":90,"weight":3},"cost":{"fixed":{"type":"lognormal","mean":10,"sd":2},"perDay":{"type":"lognormal","low":1,"high":2,"lowPercentile":5,"highPercentile":95},"actual":1.25},"predecessors":["B",{"activity":"B","type":"SS","lag":-2.5}],"demands":[{"pool":"rig","units":1}],"drivers":[],"calendar":"five","earliestStart":"2027-02-01","tags":{}},{"id":"B","duration":{"type":"discrete","outcomes":[{"value":1,"probability":0.25},{"value":2,"probability":0.75}]},"actualStart":"2027-01-01","remaining":{"type":"percentiles","points":[{"p":0,"value":1},{"p":100,"value":9}]}},{"id":"C","milestone":true,"commitment":"2027-12-01"}],"riskEvents":[{"id":"flood","probability":0.2,"impacts":[{"activity":"A","delay":{"type":"normal","mean":3,"sd":1,"min":0}}]}],"chanceBranches":[{"id":"fork","branches":[{"id":"x","probability":1,"activities":["A"]}]}]}]}
        """;

    [Fact]
    public void EveryMemberIsKeptAsSent()
    {
        var sent = Encoding.UTF8.GetBytes(Everything);
        var document = Reader.ReadDocument(sent);
        var projects = string.Join(",", document.Projects!.Select(project => Encoding.UTF8.GetString(DocumentReader.Bytes(project))));
        var written = $$"""{"settings":{{Encoding.UTF8.GetString(DocumentReader.Bytes(document.Settings!))}},"projects":[{{projects}}]}""";
        Assert.Equal(Everything.Trim(), written);
    }

    [Fact]
    public void EveryMemberReachesTheModel()
    {
        var reading = new Reading();
        var model = Reader.ReadDocument(Encoding.UTF8.GetBytes(Everything)).ToModel(reading);
        Assert.Empty(reading.Faults);
        Assert.Equal((1L << 53) - 1, model.Settings.Seed);
        Assert.Equal(DayOfWeek.Friday, model.Settings.WeekEnds);
        Assert.Equal(new MonthDay(4, 1), model.Settings.FiscalYearStart);
        Assert.Equal(1000.50m, model.Settings.Commitments!.Budget);
        Assert.Equal(new DateOnly(2028, 1, 31), model.Settings.ProgrammeCommitments["locks"].Finish);
        Assert.Equal(new CapacityChange(new DateOnly(2027, 6, 1), 1), model.Settings.Pools[0].CapacityChanges[0]);
        Assert.Equal(PoolRule.InOrder, model.Settings.PoolRule);
        Assert.Equal(new RankPair("driver/ground", "project/weir", 0.3), model.Settings.Dependence.Pairs[0]);
        Assert.Equal("weir", model.Settings.RiskEvents[0].Impacts[1].Project);
        var work = model.Projects[0].Activities;
        Assert.Equal(new Pert(1, 2, 4, 3, 10, 90), work[0].Duration);
        Assert.Equal(new LognormalByMoments(10, 2), work[0].Cost!.Fixed);
        Assert.Equal(new LognormalByPercentiles(1, 2, 5, 95), work[0].Cost!.PerDay);
        Assert.Equal(new Link("B", LinkType.StartToStart, -2.5), work[0].Predecessors[1]);
        Assert.Equal(new Outcome(2, 0.75), Assert.IsType<Discrete>(work[1].Duration).Outcomes[1]);
        Assert.Equal(new PercentilePoint(100, 9), Assert.IsType<Percentiles>(work[1].Remaining).Points[1]);
        Assert.True(work[2].Milestone);
        Assert.Equal(new Normal(3, 1, 0), model.Projects[0].RiskEvents[0].Impacts[0].Delay);
    }

    [Theory]
    [InlineData("", "", "json.malformed")]
    [InlineData("{", "", "json.malformed")]
    [InlineData("{ \n", "", "json.malformed")]
    [InlineData("[", "", "json.malformed")]
    [InlineData("{'settings':{}}", "", "json.malformed")]
    [InlineData("{/* no */\"settings\":{}}", "", "json.malformed")]
    [InlineData("{\"settings\":", "/settings", "json.malformed")]
    [InlineData("{\"settings\":{\"name\"", "/settings", "json.malformed")]
    [InlineData("{\"settings\":{\"name\":\"a\"", "/settings/name", "json.malformed")]
    [InlineData("{\"settings\":{\"name\":\"a", "/settings/name", "json.malformed")]
    [InlineData("{\"projects\":[{\"id\":\"a\"},", "/projects/0", "json.malformed")]
    [InlineData("{\"settings\":{\"name\":\"a\",}}", "/settings/name", "json.malformed")]
    [InlineData("{\"settings\":{} } x", "", "json.malformed")]
    [InlineData("{\"settings\":{ /* no */ }}", "/settings", "json.malformed")]
    [InlineData("{\"settings\":{\"nam\":\"a\"}}", "/settings/nam", "member.unknown")]
    [InlineData("{\"projects\":[{},{\"id\":\"x\",\"Id\":\"y\"}]}", "/projects/1/Id", "member.unknown")]
    [InlineData("{\"projects\":[{},{\"id\":\"x\",\"id\":\"y\"}]}", "/projects/1/id", "member.duplicate")]
    [InlineData("{\"projects\":[{\"activities\":[{\"duration\":{\"type\":\"uniform\",\"low\":1,\"low\":1}}]}]}", "/projects/0/activities/0/duration/low", "member.duplicate")]
    [InlineData("{\"projects\":[{\"activities\":[{\"duration\":{\"odd\":1,\"odd\":1}}]}]}", "/projects/0/activities/0/duration/odd", "member.duplicate")]
    [InlineData("{\"projects\":[{\"tags\":{\"a/b\":\"x\",\"a/b\":\"y\"}}]}", "/projects/0/tags/a~1b", "member.duplicate")]
    [InlineData("{\"projects\":[{\"id\":7}]}", "/projects/0/id", "member.kind")]
    [InlineData("{\"projects\":[{\"correlation\":\"0.3\"}]}", "/projects/0/correlation", "member.kind")]
    [InlineData("{\"projects\":[{\"priority\":true}]}", "/projects/0/priority", "member.kind")]
    [InlineData("{\"projects\":[{\"commitments\":{\"budget\":\"12\"}}]}", "/projects/0/commitments/budget", "member.kind")]
    [InlineData("{\"projects\":{}}", "/projects", "member.kind")]
    [InlineData("{\"projects\":[{\"tags\":{\"a.b\":1}}]}", "/projects/0/tags/a.b", "member.kind")]
    [InlineData("{\"projects\":[{\"activities\":[{\"duration\":\"8\"}]}]}", "/projects/0/activities/0/duration", "member.kind")]
    [InlineData("{\"projects\":[{\"activities\":[{\"predecessors\":[\"A\",5]}]}]}", "/projects/0/activities/0/predecessors/1", "member.kind")]
    [InlineData("[]", "", "member.kind")]
    [InlineData("null", "", "member.kind")]
    [InlineData("{\"settings\":{\"indices\":[[[[[[[[[[[[[[[[]]]]]]]]]]]]]]]]}}", "/settings/indices/0/0/0/0/0/0/0/0/0/0/0/0/0/0", "json.depth")]
    public void WhatIsNotTheRightJsonNamesTheFirstPlace(string json, string path, string code)
    {
        var refused = Assert.Throws<JsonRefused>(() => Reader.ReadDocument(Encoding.UTF8.GetBytes(json)));
        Assert.Equal((path, code), (refused.Fault.Path, refused.Fault.Code));
    }

    [Theory]
    [InlineData("{\"projects\":[null]}", "/projects/0")]
    [InlineData("{\"projects\":[{\"drivers\":[null]}]}", "/projects/0/drivers/0")]
    [InlineData("{\"projects\":[{\"tags\":{\"x\":null}}]}", "/projects/0/tags/x")]
    [InlineData("{\"projects\":[{\"activities\":[{\"predecessors\":[null]}]}]}", "/projects/0/activities/0/predecessors/0")]
    [InlineData("{\"settings\":{\"commitments\":{\"programmes\":{\"p\":null}}}}", "/settings/commitments/programmes/p")]
    public void NullInAListIsAValueOfTheWrongKind(string json, string path)
    {
        var document = Reader.ReadDocument(Encoding.UTF8.GetBytes(json));
        Assert.Equal(path, Assert.Throws<JsonRefused>(() => document.ToModel(new Reading())).Fault.Path);
    }

    [Fact]
    public void MalformedJsonTellsLineAndColumn()
    {
        var refused = Assert.Throws<JsonRefused>(() => Reader.ReadDocument("{\n \"settings\": {\n  \"name\": \"ü\" \"currency\"\n}}"u8.ToArray()));
        Assert.Equal((3, 15), (refused.Line, refused.Column));
    }
}
