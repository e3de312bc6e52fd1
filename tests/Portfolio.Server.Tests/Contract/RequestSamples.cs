using System.Text;
using System.Text.Json.Nodes;

namespace Portfolio.Server.Tests.Contract;

/// <summary>A request for any operation of the description, so that tests over all operations take in new ones by themselves.</summary>
/// <param name="names">What stands for the parameters of addresses.</param>
internal sealed class RequestSamples(DescribedApi api, IReadOnlyDictionary<string, string> names)
{
    // Where the smallest body that fits the schema would be refused for its meaning.
    private static readonly Dictionary<string, string> Bodies = new()
    {
        ["Document"] = """{"settings":{"name":"Replaced","currency":"EUR"},"projects":[]}""",
        ["KeyRequest"] = """{"name":"of a test","grants":[{"right":"read","portfolio":"nowhere"}]}""",
        ["SubscriptionRequest"] = """{"url":"http://localhost:1/","events":[{"type":"run.failed"}]}""",
        ["Schedule"] = """{"cron":"30 4 * * *"}""",
    };

    private readonly SchemaSamples samples = new(api);

    public HttpRequestMessage Of(DescribedOperation operation)
    {
        var request = new HttpRequestMessage(new HttpMethod(operation.Method), AddressOf(operation));
        if (operation.BodyType is { } type)
            request.Content = new StringContent(BodyOf(operation), Encoding.UTF8, type);
        return request;
    }

    public string AddressOf(DescribedOperation operation) => string.Join('/', operation.Template.Split('/').Select(segment =>
        segment.StartsWith('{') ? Uri.EscapeDataString(NameOf(operation, segment.Trim('{', '}'))) : segment));

    /// <summary>A body that is taken as far as the description tells.</summary>
    public string BodyOf(DescribedOperation operation)
    {
        return Bodies.GetValueOrDefault(operation.BodyName) ?? samples.Smallest(operation.BodySchema!)?.ToJsonString() ?? "{}";
    }

    private string NameOf(DescribedOperation operation, string parameter)
    {
        Assert.True(
            names.ContainsKey(parameter),
            $"{operation.Name} has a parameter '{parameter}' in its address: add what stands for it to {nameof(PathNames)}.");
        return names[parameter];
    }
}
