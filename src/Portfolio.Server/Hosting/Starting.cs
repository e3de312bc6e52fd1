using Portfolio.Store;

namespace Portfolio.Server.Hosting;

/// <summary>Runs the server until it is told to stop; why the storage cannot be used is said in one line, not as a crash.</summary>
internal static class Starting
{
    private const int CannotStart = 1;

    public static async Task<int> RunToEndAsync(this WebApplication app)
    {
        try
        {
            await app.RunAsync();
            return 0;
        }
        catch (Exception refused) when (refused is StoreInUseException or StoreSchemaException)
        {
            await Console.Error.WriteLineAsync(refused.Message);
            return CannotStart;
        }
    }
}
