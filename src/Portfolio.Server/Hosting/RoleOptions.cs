using System.ComponentModel.DataAnnotations;

namespace Portfolio.Server.Hosting;

/// <summary>What this process does (<c>Roles</c>): serve, work on runs, or both.</summary>
public sealed class RoleOptions
{
    [AllowedValues("all", "api", "worker", ErrorMessage = "Roles must be all, api or worker.")]
    public string Roles { get; set; } = "all";

    public bool Works => Roles is "all" or "worker";

    public bool Serves => Roles is "all" or "api";
}
