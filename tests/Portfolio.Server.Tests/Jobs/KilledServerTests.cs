using Portfolio.Server.Tests.Hosting;
using Portfolio.Server.Tests.Runs;

namespace Portfolio.Server.Tests.Jobs;

public sealed class KilledServerTests
{
    // Twenty blocks.
    private const string Run = """{"iterations":81920}""";

    [Fact]
    public async Task KilledOrStoppedARunGoesOnAfterTheRestartAndGivesTheSameBits()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals of Unix are sent.");
        var directory = Directory.CreateTempSubdirectory("portfolio-");
        try
        {
            string killed, stopped;
            using (var first = await ServerProcess.StartAsync(directory.FullName))
            {
                await first.Client.PutJsonAsync("/v1/portfolios/p/document", RunSamples.Uncertain(projects: 10, activities: 30));
                killed = await first.Client.RunAsync("p", Run);
                await first.Client.UntilSomeBlocksAreStoredAsync("p", killed);
                await first.KillAsync();
            }
            using (var second = await ServerProcess.StartAsync(directory.FullName))
            {
                var resumed = await second.Client.UntilAsync("p", killed, "succeeded");
                Assert.Equal(2, resumed.GetProperty("attempt").GetInt32());
                stopped = await second.Client.RunAsync("p", Run);
                await second.Client.UntilSomeBlocksAreStoredAsync("p", stopped);
                Assert.Equal(0, await second.StopAsync());
            }
            using var third = await ServerProcess.StartAsync(directory.FullName);
            var again = await third.Client.UntilAsync("p", stopped, "succeeded");
            Assert.Equal(2, again.GetProperty("attempt").GetInt32());
            var undisturbed = await third.Client.SucceedAsync("p", Run);
            Assert.Equal(1, undisturbed.GetProperty("attempt").GetInt32());
            var before = await third.Client.ReadRunAsync("p", killed);
            Assert.Equal(undisturbed.Text("resultDigest"), before.Text("resultDigest"));
            Assert.Equal(undisturbed.Text("resultDigest"), again.Text("resultDigest"));
        }
        finally
        {
            directory.Delete(recursive: true);
        }
    }
}
