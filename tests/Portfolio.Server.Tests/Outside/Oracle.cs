using System.Text.Json;

namespace Portfolio.Server.Tests.Outside;

/// <summary>The simulator that stands outside the product: it shares no code with it and draws its own random numbers.</summary>
internal static class Oracle
{
    private static readonly JsonSerializerOptions Options = new(JsonSerializerDefaults.Web);

    /// <summary>Base values of every document, all in one process.</summary>
    public static Task<IReadOnlyList<OracleAnswer<OracleBase>>> Base(IReadOnlyList<byte[]> documents, CancellationToken stop) =>
        Ask<OracleBase>([.. documents.Select(document => new OracleJob(document, 0))], stop);

    /// <summary>Percentiles of a simulation of every document.</summary>
    public static Task<IReadOnlyList<OracleAnswer<OracleFigures>>> Simulate(IReadOnlyList<OracleJob> jobs, CancellationToken stop) =>
        Ask<OracleFigures>(jobs, stop);

    private static async Task<IReadOnlyList<OracleAnswer<T>>> Ask<T>(IReadOnlyList<OracleJob> jobs, CancellationToken stop)
    {
        var simulator = SharedFolder.Check("oracle.py");
        var driver = Path.Combine(Repository.Root, "tests", "Portfolio.Server.Tests", "Outside", "oracle_driver.py");
        var folder = Directory.CreateTempSubdirectory("portfolio-outside-");
        try
        {
            for (var i = 0; i < jobs.Count; i++)
                await File.WriteAllBytesAsync(Path.Combine(folder.FullName, $"{i}.json"), jobs[i].Document, stop);
            var input = JsonSerializer.Serialize(jobs.Select((job, i) => new
            {
                document = Path.Combine(folder.FullName, $"{i}.json"), iterations = job.Iterations, seed = job.Seed, levels = OracleJob.Levels,
            }));
            var lines = (await Python.Run([driver, simulator], input, stop)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
            return [.. lines.Select(line => JsonSerializer.Deserialize<OracleAnswer<T>>(line, Options)!)];
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }
}

/// <summary>What is asked of the simulator.</summary>
internal sealed record OracleJob(byte[] Document, int Iterations, int Seed = 7)
{
    public static readonly double[] Levels = [10, 50, 80, 90];
}

/// <summary>The answer for one document, by scope; times are days after the epoch, which is itself days after 1970-01-01.</summary>
internal sealed record OracleAnswer<T>(int Epoch, IReadOnlyDictionary<string, T> Scopes);

/// <summary>Base values of a scope: time of the finish and its date, cost not rounded (null of a milestone).</summary>
internal sealed record OracleBase(double Time, DateOnly Date, double? Cost);

/// <summary>Percentiles of a scope.</summary>
internal sealed record OracleFigures(OracleSeries Finish, OracleSeries? Cost);

internal sealed record OracleSeries(int Count, double Mean, double Sd, IReadOnlyList<OracleLevel> Levels);

/// <summary>A percentile with the values four standard errors of its rank below and above.</summary>
internal sealed record OracleLevel(double Level, double Value, double Low, double High);
