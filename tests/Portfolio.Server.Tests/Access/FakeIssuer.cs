using System.Buffers.Text;
using System.Net;
using System.Security.Cryptography;
using System.Text;
using Microsoft.AspNetCore.Authentication.JwtBearer;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.IdentityModel.Tokens;

namespace Portfolio.Server.Tests.Access;

/// <summary>An issuer of tokens with a key of its own, reached without a network. Tokens are put together by hand, bad ones too.</summary>
internal sealed class FakeIssuer : HttpMessageHandler
{
    public const string Address = "https://issuer.invalid";
    public const string Audience = "portfolio";

    private readonly RSA key = RSA.Create(2048);
    private readonly RSA foreign = RSA.Create(2048);

    public static (string, string?)[] Settings => [("Security:Oidc:Authority", Address), ("Security:Oidc:Audience", Audience)];

    /// <summary>Lets the server reach this issuer.</summary>
    public void Join(IServiceCollection services) =>
        services.Configure<JwtBearerOptions>("Token", bearer => bearer.BackchannelHttpHandler = this);

    /// <summary>A token signed as its header says.</summary>
    public string Sign(string claims, string header = """{"alg":"RS256","typ":"JWT","kid":"one"}""")
    {
        var text = $"{Encode(header)}.{Encode(claims)}";
        return $"{text}.{Base64Url.EncodeToString(key.SignData(Encoding.UTF8.GetBytes(text), HashAlgorithmName.SHA256, RSASignaturePadding.Pkcs1))}";
    }

    public string SignByAnother(string claims)
    {
        var text = $"{Encode("""{"alg":"RS256","typ":"JWT","kid":"one"}""")}.{Encode(claims)}";
        return $"{text}.{Base64Url.EncodeToString(foreign.SignData(Encoding.UTF8.GetBytes(text), HashAlgorithmName.SHA256, RSASignaturePadding.Pkcs1))}";
    }

    /// <summary>With the public key, which anybody has, as shared secret.</summary>
    public string SignWithPublicKey(string claims)
    {
        var text = $"{Encode("""{"alg":"HS256","typ":"JWT","kid":"one"}""")}.{Encode(claims)}";
        var secret = Encoding.ASCII.GetBytes(key.ExportSubjectPublicKeyInfoPem());
        return $"{text}.{Base64Url.EncodeToString(HMACSHA256.HashData(secret, Encoding.UTF8.GetBytes(text)))}";
    }

    public static string Unsigned(string claims, string header = """{"alg":"none","typ":"JWT"}""") => $"{Encode(header)}.{Encode(claims)}.";

    private static string Encode(string text) => Base64Url.EncodeToString(Encoding.UTF8.GetBytes(text));

    protected override Task<HttpResponseMessage> SendAsync(HttpRequestMessage request, CancellationToken cancellationToken)
    {
        var web = JsonWebKeyConverter.ConvertFromRSASecurityKey(new RsaSecurityKey(key.ExportParameters(false)));
        var text = request.RequestUri!.AbsolutePath switch
        {
            "/.well-known/openid-configuration" => $$"""{"issuer":"{{Address}}","jwks_uri":"{{Address}}/keys"}""",
            "/keys" => $$"""{"keys":[{"kty":"RSA","use":"sig","kid":"one","n":"{{web.N}}","e":"{{web.E}}"}]}""",
            _ => throw new InvalidOperationException(request.RequestUri.ToString()),
        };
        return Task.FromResult(new HttpResponseMessage(HttpStatusCode.OK) { Content = new StringContent(text, null, "application/json") });
    }

    protected override void Dispose(bool disposing)
    {
        key.Dispose();
        foreign.Dispose();
        base.Dispose(disposing);
    }
}
