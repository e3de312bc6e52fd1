using System.Text.Json.Nodes;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Tests.Contracts;

public sealed class MergePatchTests
{
    // The fifteen vectors of RFC 7396, appendix A, in its order, then the example of its section 3.
    [Theory]
    [InlineData("""{"a":"b"}""", """{"a":"c"}""", """{"a":"c"}""")]
    [InlineData("""{"a":"b"}""", """{"b":"c"}""", """{"a":"b","b":"c"}""")]
    [InlineData("""{"a":"b"}""", """{"a":null}""", """{}""")]
    [InlineData("""{"a":"b","b":"c"}""", """{"a":null}""", """{"b":"c"}""")]
    [InlineData("""{"a":["b"]}""", """{"a":"c"}""", """{"a":"c"}""")]
    [InlineData("""{"a":"c"}""", """{"a":["b"]}""", """{"a":["b"]}""")]
    [InlineData("""{"a":{"b":"c"}}""", """{"a":{"b":"d","c":null}}""", """{"a":{"b":"d"}}""")]
    [InlineData("""{"a":[{"b":"c"}]}""", """{"a":[1]}""", """{"a":[1]}""")]
    [InlineData("""["a","b"]""", """["c","d"]""", """["c","d"]""")]
    [InlineData("""{"a":"b"}""", """["c"]""", """["c"]""")]
    [InlineData("""{"a":"foo"}""", """null""", """null""")]
    [InlineData("""{"a":"foo"}""", "\"bar\"", "\"bar\"")]
    [InlineData("""{"e":null}""", """{"a":1}""", """{"e":null,"a":1}""")]
    [InlineData("""[1,2]""", """{"a":"b","c":null}""", """{"a":"b"}""")]
    [InlineData("""{}""", """{"a":{"bb":{"ccc":null}}}""", """{"a":{"bb":{}}}""")]
    [InlineData(
        """{"title":"Goodbye!","author":{"givenName":"John","familyName":"Doe"},"tags":["example","sample"],"content":"This will be unchanged"}""",
        """{"title":"Hello!","phoneNumber":"+01-123-456-7890","author":{"familyName":null},"tags":["example"]}""",
        """{"title":"Hello!","author":{"givenName":"John"},"tags":["example"],"content":"This will be unchanged","phoneNumber":"+01-123-456-7890"}""")]
    public void TheVectorsOfTheStandardHold(string original, string patch, string result)
    {
        var (target, changes) = (JsonNode.Parse(original), JsonNode.Parse(patch));
        var merged = MergePatch.Apply(target, changes);
        Assert.True(JsonNode.DeepEquals(JsonNode.Parse(result), merged), merged?.ToJsonString() ?? "null");
        Assert.True(JsonNode.DeepEquals(JsonNode.Parse(original), target), "The target was changed.");
        Assert.True(JsonNode.DeepEquals(JsonNode.Parse(patch), changes), "The patch was changed.");
    }

    [Fact]
    public void NumbersKeepTheDigitsTheyWereSentWith() =>
        Assert.Equal("""{"a":1.50,"b":2.0}""", MergePatch.Apply(JsonNode.Parse("""{"a":1.50}"""), JsonNode.Parse("""{"b":2.0}"""))!.ToJsonString());

    [Theory]
    [InlineData("", "")]
    [InlineData("/a", "/a")]
    [InlineData("/a/1/x~1y", "/a/1/x~1y")]
    [InlineData("/gone", "/gone")]
    [InlineData("/a/2", "")]
    [InlineData("/a/x", "")]
    [InlineData("/b/c", "")]
    [InlineData("/gone/deeper", "")]
    public void APointerStandsWhereItWasSent(string pointer, string expected) =>
        Assert.Equal(expected, SentPointers.OrStored(JsonNode.Parse("""{"a":[0,{"x/y":1}],"b":2,"gone":null}"""), pointer));
}
