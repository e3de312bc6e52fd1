using Portfolio.Model.Documents;
using Portfolio.Model.Faults;
using Portfolio.Model.Tests.Rules.Tables;

namespace Portfolio.Model.Tests.Rules;

/// <summary>Every row of every table: the broken document gives exactly its one fault, the sound one none.</summary>
public sealed class RuleTableTests
{
    private static readonly RuleCase[] Rows =
    [
        .. SettingsTable.Cases, .. CalendarAndPoolTable.Cases, .. DependenceTable.Cases, .. ProjectTable.Cases, .. ProgressTable.Cases,
        .. LinkTable.Cases, .. EventTable.Cases, .. BranchTable.Cases, .. DistributionTable.Cases, .. AcrossTable.Cases,
    ];

    private static readonly Dictionary<string, RuleCase> Cases = Rows.Index().ToDictionary(c => $"{c.Index + 1:000} {c.Item.Code} at {c.Item.Path}", c =>
        c.Item);

    public static TheoryData<string> Names => [.. Cases.Keys];

    [Theory]
    [MemberData(nameof(Names))]
    public void The_broken_document_gives_its_fault(string name)
    {
        var expected = Cases[name];
        var fault = Assert.Single(Sound.FaultsOf(expected.Broken));
        Assert.Equal((expected.Code, expected.Path, expected.Subject), (fault.Code, fault.Path, fault.Subject));
        Assert.EndsWith(".", fault.Message);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void The_sound_neighbour_gives_none(string name) => Assert.Empty(Sound.FaultsOf(Cases[name].Sound));

    [Fact]
    public void Every_code_of_a_rule_stands_in_a_table()
    {
        var codes = typeof(RuleCodes).GetFields().Select(f => (string)f.GetRawConstantValue()!).ToList();
        Assert.Equal(codes.Count, codes.Distinct().Count());
        Assert.Equal(
            [.. codes.Append(FaultCodes.MoneyDecimals).Append(FaultCodes.NumberNotFinite).Order(StringComparer.Ordinal)],
            Cases.Values.Select(c => c.Code).Distinct().Order(StringComparer.Ordinal));
    }

    [Fact]
    public void The_sound_document_is_valid() => Assert.Empty(Sound.FaultsOf(Sound.Document));
}
