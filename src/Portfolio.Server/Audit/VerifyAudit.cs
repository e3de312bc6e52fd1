using Portfolio.Server.Hosting;
using Portfolio.Store.Audit;

namespace Portfolio.Server.Audit;

/// <summary>
/// The command <c>verify-audit</c>: recomputes the audit trail of the configured storage, also beside a server that is running, and says
/// whether it is whole. Exit code 0: whole; 1: broken; 2: it could not be read.
/// </summary>
internal static class VerifyAudit
{
    private const string Command = "verify-audit";

    public static bool IsAsked(string[] arguments) => arguments.FirstOrDefault() == Command;

    public static async Task<int> RunAsync(string[] arguments, TextWriter output, TextWriter errors)
    {
        var configuration = WebApplication.CreateBuilder(arguments[1..]).Configuration;
        var storage = configuration.GetSection(StorageOptions.Section).Get<StorageOptions>() ?? new StorageOptions();
        try
        {
            var found = string.IsNullOrEmpty(storage.Postgres)
                ? await AuditCheck.OfFolderAsync(storage.Directory, CancellationToken.None)
                : await AuditCheck.OfPostgresAsync(storage.Postgres, CancellationToken.None);
            await output.WriteLineAsync(
                found.FirstBroken is { } broken
                    ? $"Entry {broken} is missing or altered; the {found.Entries} before it are whole, head {found.HeadHash}"
                    : $"{found.Entries} entries, chain whole, head {found.HeadHash}");
            return found.FirstBroken is null ? 0 : 1;
        }
        catch (IOException unreadable)
        {
            await errors.WriteLineAsync(unreadable.Message);
            return 2;
        }
    }
}
