namespace Portfolio.Store.Runs;

/// <summary>The rows that say how far a run has come, and the samples that hang on them.</summary>
internal static class RunBlocks
{
    private const string DropSamplesSql = "delete from sample where run = @Run";

    private const string DropBlocksSql = "delete from run_block where run = @Run";

    /// <summary>Forgets what was worked: the run begins again.</summary>
    public static async Task DropAsync(StoreTransaction open, string run)
    {
        await open.ExecuteAsync(DropSamplesSql, new { Run = run });
        await open.ExecuteAsync(DropBlocksSql, new { Run = run });
    }

    /// <summary>Frees the room of a run that ended without a result; how far it had come stays known.</summary>
    public static Task DropSamplesAsync(StoreTransaction open, string run) => open.ExecuteAsync(DropSamplesSql, new { Run = run });
}
