using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Hosting;

/// <summary>How the first administrator gets in (<c>Security</c>).</summary>
public sealed class SecurityOptions
{
    public const string Section = "Security";

    /// <summary>Becomes the first administrator key when there is none; unset or empty: one is generated into a file.</summary>
    [MinLength(32, ErrorMessage = "Security:BootstrapKey must have at least 32 characters.")]
    public string? BootstrapKey
    {
        get;
        set => field = string.IsNullOrEmpty(value) ? null : value;
    }
}
