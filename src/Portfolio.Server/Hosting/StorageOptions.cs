using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Hosting;

/// <summary>Where things are kept (<c>Storage</c>).</summary>
public sealed class StorageOptions
{
    public const string Section = "Storage";

    /// <summary>Folder of the embedded database (then one process at a time), of backups and of the first key.</summary>
    [Required]
    public string Directory { get; set; } = "./data";

    /// <summary>Connection string of a PostgreSQL database that is used in place of the embedded one; unset or empty: none.</summary>
    public string? Postgres
    {
        get;
        set => field = string.IsNullOrEmpty(value) ? null : value;
    }

    public string FirstKeyFile => Path.GetFullPath(Path.Combine(Directory, "first-key.txt"));
}
