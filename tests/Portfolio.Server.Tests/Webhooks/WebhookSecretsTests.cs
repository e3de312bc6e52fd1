using System.Text;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Deliveries;

namespace Portfolio.Server.Tests.Webhooks;

public sealed class WebhookSecretsTests
{
    // The example that the libraries of the Standard Webhooks specification share, with its secret.
    private const string Secret = "whsec_MfKQ9r8GKYqrTwjUPD8ILPZIo2LaLaSw";
    private const string Id = "msg_p5jXN8AQM9LWM0D4loKWxJek";
    private const long Timestamp = 1614265330;
    private const string Signature = "v1,g0hM9SsE+OTPJTGt/tmIKtSyZlE3uFJELVlNIOLJ1OE=";

    private static readonly byte[] Body = Encoding.UTF8.GetBytes("""{"test": 2432232314}""");

    [Fact]
    public void ThePublishedExampleIsSignedAsPublished() =>
        Assert.Equal(Signature, WebhookSecrets.Sign(new SigningSecrets(Secret, null), Id, Timestamp, Body));

    [Fact]
    public void WhileASecretIsReplacedBothSignThePresentOneFirst()
    {
        var other = WebhookSecrets.New();
        var alone = WebhookSecrets.Sign(new SigningSecrets(other, null), Id, Timestamp, Body);
        Assert.NotEqual(Signature, alone);
        Assert.Equal($"{alone} {Signature}", WebhookSecrets.Sign(new SigningSecrets(other, Secret), Id, Timestamp, Body));
    }

    [Theory]
    [InlineData("msg_p5jXN8AQM9LWM0D4loKWxJel", Timestamp, """{"test": 2432232314}""")]
    [InlineData(Id, Timestamp + 1, """{"test": 2432232314}""")]
    [InlineData(Id, Timestamp, """{"test": 2432232315}""")]
    public void IdTimeAndBodyAreAllSigned(string id, long timestamp, string body) =>
        Assert.NotEqual(Signature, WebhookSecrets.Sign(new SigningSecrets(Secret, null), id, timestamp, Encoding.UTF8.GetBytes(body)));

    [Fact]
    public void ANewSecretIsThePrefixAnd256RandomBits()
    {
        var (one, two) = (WebhookSecrets.New(), WebhookSecrets.New());
        Assert.NotEqual(one, two);
        Assert.StartsWith("whsec_", one);
        Assert.Equal(32, Convert.FromBase64String(one["whsec_".Length..]).Length);
    }

    [Fact]
    public void SecretsPrintNothing() => Assert.DoesNotContain("whsec", new SigningSecrets(Secret, Secret).ToString());
}
