using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Hosting;

/// <summary>Whose tokens are taken beside keys (<c>Security:Oidc</c>); nobody's while neither authority nor issuer is set.</summary>
public sealed class OidcOptions : IValidatableObject
{
    public const string Section = "Security:Oidc";

    // Signatures that only the issuer can make. Never "none", never a shared secret.
    private static readonly string[] Asymmetric =
        ["RS256", "RS384", "RS512", "PS256", "PS384", "PS512", "ES256", "ES384", "ES512"];

    /// <summary>Where the issuer's description and keys are read (OpenID Connect Discovery); default: <see cref="Issuer"/>.</summary>
    public string? Authority { get; set; }

    /// <summary>What tokens must say in <c>iss</c>; default: what the description says.</summary>
    public string? Issuer { get; set; }

    /// <summary>What tokens must say in <c>aud</c>.</summary>
    public string? Audience { get; set; }

    /// <summary>Signature algorithms that are taken, with commas.</summary>
    public string Algorithms { get; set; } = "RS256,ES256";

    /// <summary>The claim that states rights: <c>read:weir-portfolio</c>, <c>manage:*</c>, <c>submit:weir-portfolio/weir-lock</c>.</summary>
    [Required]
    public string Claim { get; set; } = "portfolio_rights";

    public bool IsOn => Discovery is not null;

    public string? Discovery => !string.IsNullOrEmpty(Authority) ? Authority : !string.IsNullOrEmpty(Issuer) ? Issuer : null;

    public IReadOnlyList<string> AlgorithmList =>
        Algorithms.Split(',', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);

    public IEnumerable<ValidationResult> Validate(ValidationContext context)
    {
        if (!IsOn)
            yield break;
        if (!Uri.TryCreate(Discovery, UriKind.Absolute, out var address) || address.Scheme != Uri.UriSchemeHttps)
            yield return new ValidationResult("Security:Oidc:Authority must be an https address.");
        if (string.IsNullOrEmpty(Audience))
            yield return new ValidationResult("Security:Oidc:Audience is missing: tokens meant for others would be taken.");
        if (AlgorithmList.Count == 0 || AlgorithmList.Except(Asymmetric, StringComparer.Ordinal).Any())
            yield return new ValidationResult($"Security:Oidc:Algorithms may name {string.Join(", ", Asymmetric)}.");
    }
}
