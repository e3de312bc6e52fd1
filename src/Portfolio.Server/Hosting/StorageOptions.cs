using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Hosting;

/// <summary>Where things are kept (<c>Storage</c>).</summary>
public sealed class StorageOptions
{
    public const string Section = "Storage";

    /// <summary>Folder of the embedded database and of backups; one process at a time.</summary>
    [Required]
    public string Directory { get; set; } = "./data";

    /// <summary>Connection string; not served yet and therefore refused.</summary>
    public string? Postgres { get; set; }

    public string FirstKeyFile => Path.GetFullPath(Path.Combine(Directory, "first-key.txt"));
}
