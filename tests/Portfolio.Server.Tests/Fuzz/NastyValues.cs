using System.Text.Json.Nodes;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>Texts, numbers and values at which programs have stumbled before.</summary>
internal static class NastyValues
{
    public static readonly string[] Texts =
    [
        "", " ", ".", "..", "-", "*", "%", "%00", "%2e%2e", "a/b", "a\\b", "latest", "self", "null", "undefined", "true", "NaN",
        "Infinity", "0", "-1", "1e9",
        "9223372036854775807", "9223372036854775808", "2147483648", "\u0000", "\u0007", "a\r\nb", "\uFEFF", "é", "e\u0301", "ﬁ", "İ",
        "𝒳", "\uD83D\uDE00", "\u202E",
        "=1+1", "@x", "'; drop table portfolio; --", "<script>", "${x}", "{{x}}", "2027-02-30", "0000-00-00", "9999-12-31",
        "1969-12-31", "2027-01-04T25:00:00Z",
        "driver/", "project/", "programme/locks", "milestone/weir/M", "portfolio", new('a', 64), new('a', 65), new('9', 400),
        new('x', 3000),
    ];

    public static readonly string[] Numbers =
    [
        "0", "-0", "1", "-1", "0.5", "80", "99.5", "100", "100.0000001", "1e-320", "5e-324", "1e308", "-1e308", "1e999", "-1e999",
        "2147483647", "2147483648",
        "9007199254740991", "9007199254740993", "9223372036854775807", "1e19", "0.1000000000000000055511151231257827",
        "123456789012345678901234567890",
    ];

    private static readonly string[] Values =
    [
        "null", "true", "false", "[]", "{}", "[[]]", "[null]", """{"type":"pert"}""", """{"id":"a"}""", "\"\"", "\"x\"",
    ];

    public static JsonNode? Number(Dice dice) => JsonNode.Parse(dice.Pick(Numbers));

    // A lone surrogate is no text that JSON can carry; the texts above have none.
    public static JsonNode? Any(Dice dice) => dice.Whole(0, 2) switch
    {
        0 => JsonNode.Parse(dice.Pick(Values)),
        1 => Number(dice),
        _ => dice.Pick(Texts),
    };
}
