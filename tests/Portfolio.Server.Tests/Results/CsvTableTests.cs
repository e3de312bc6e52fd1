using System.Text;
using Portfolio.Server.Contracts.Csv;

namespace Portfolio.Server.Tests.Results;

public sealed class CsvTableTests
{
    [Theory]
    [InlineData("=1+1", "\"'=1+1\"")]
    [InlineData("+49", "\"'+49\"")]
    [InlineData("-weir", "\"'-weir\"")]
    [InlineData("@sum", "\"'@sum\"")]
    [InlineData("\tx", "\"'\tx\"")]
    [InlineData("\rx", "\"'\rx\"")]
    [InlineData("a,b", "\"a,b\"")]
    [InlineData("say \"so\"", "\"say \"\"so\"\"\"")]
    [InlineData("two\r\nlines", "\"two\r\nlines\"")]
    [InlineData("weir-lock", "weir-lock")]
    public void TextIsQuotedAndNoFormula(string text, string written) => Assert.Equal($"name\r\n{written}\r\n", Written(["name"], text));

    [Fact]
    public void NumbersAndDatesAreWrittenForMachines() =>
        Assert.Equal("a,b,c,d,e\r\n-1234.50,0.1,2027-03-31,,7\r\n", Written(["a", "b", "c", "d", "e"], -1234.50m, 0.1, new DateOnly(2027, 3, 31), null, 7L));

    private static string Written(string[] header, params object?[] line) => Encoding.UTF8.GetString(new CsvTable("x", header, [line]).ToBytes());
}
