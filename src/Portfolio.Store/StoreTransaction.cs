using System.Data;
using System.Data.Common;
using Dapper;

namespace Portfolio.Store;

/// <summary>An open transaction of the store. Others receive it only to let rows of their own stand or fall with a write.</summary>
public sealed class StoreTransaction
{
    private readonly DbTransaction transaction;
    private readonly Action<string>? beforeStatement;

    static StoreTransaction() => MatchColumns();

    /// <summary>Columns called a_b are read into members called AB.</summary>
    internal static void MatchColumns() => DefaultTypeMap.MatchNamesWithUnderscores = true;

    /// <param name="transaction">Open; committed by whoever made it.</param>
    /// <param name="now">The one instant that all rows of the transaction carry, microseconds.</param>
    /// <param name="beforeStatement">Told of each statement before it is run: where tests let storage fail.</param>
    internal StoreTransaction(DbTransaction transaction, long now, Action<string>? beforeStatement, CancellationToken cancellation)
    {
        this.transaction = transaction;
        this.beforeStatement = beforeStatement;
        Now = now;
        Cancellation = cancellation;
    }

    internal long Now { get; }

    internal CancellationToken Cancellation { get; }

    /// <summary>Runs a statement and says how many rows it touched.</summary>
    internal Task<int> ExecuteAsync(string sql, object? parameters = null) => Connection.ExecuteAsync(Command(sql, parameters));

    // So many go over together: few round trips, and still little to wait for between two looks at whether it was called off.
    private const int Together = 256;

    /// <summary>
    /// Runs a statement once for each of these, many in one round trip where the database's driver can, and says how many rows they touched.
    /// </summary>
    internal async Task<int> ExecuteEachAsync<T>(string sql, IEnumerable<T> each)
        where T : class
    {
        var touched = 0;
        foreach (var some in each.Chunk(Connection.CanCreateBatch ? Together : 1))
            touched += some.Length == 1 ? await ExecuteAsync(sql, some[0]) : await TogetherAsync(sql, some);
        return touched;
    }

    private async Task<int> TogetherAsync<T>(string sql, T[] some)
    {
        await using var batch = Connection.CreateBatch();
        batch.Transaction = transaction;
        foreach (var one in some)
        {
            beforeStatement?.Invoke(sql);
            var command = batch.CreateBatchCommand();
            command.CommandText = sql;
            BatchParameters<T>.Add(command, one);
            batch.BatchCommands.Add(command);
        }
        return await batch.ExecuteNonQueryAsync(Cancellation);
    }

    /// <summary>The first row, or null (the default) when there is none.</summary>
    internal Task<T?> FirstAsync<T>(
        string sql, object? parameters = null) => Connection.QueryFirstOrDefaultAsync<T>(Command(sql, parameters));

    internal async Task<List<T>> ListAsync<T>(string sql, object? parameters = null) =>
        [.. await Connection.QueryAsync<T>(Command(sql, parameters))];

    // Always as many, so that there is one text, which the database need not plan anew each time.
    private const int KeysTogether = 16;

    private static readonly string KeyNames = string.Join(", ", Enumerable.Range(0, KeysTogether).Select(number => $"@Key{number}"));

    /// <summary>The rows of these keys, which the statement names as <c>in (@Keys)</c>; in its order for every sixteen of them.</summary>
    internal async Task<List<T>> ListOfAsync<T>(string sql, IEnumerable<string> keys, object? parameters = null)
    {
        var found = new List<T>();
        var text = sql.Replace("@Keys", KeyNames, StringComparison.Ordinal);
        foreach (var some in keys.Chunk(KeysTogether))
        {
            var all = new DynamicParameters(parameters);
            for (var number = 0; number < KeysTogether; number++)
                all.Add($"Key{number}", some[Math.Min(number, some.Length - 1)], DbType.String);
            found.AddRange(await ListAsync<T>(text, all));
        }
        return found;
    }

    /// <summary>Rows one by one, for results too large to hold.</summary>
    internal IAsyncEnumerable<T> StreamAsync<T>(string sql, object? parameters = null)
    {
        beforeStatement?.Invoke(sql);
        return Connection.QueryUnbufferedAsync<T>(sql, parameters, transaction);
    }

    private DbConnection Connection => transaction.Connection ?? throw new InvalidOperationException("The transaction has ended.");

    private CommandDefinition Command(string sql, object? parameters)
    {
        beforeStatement?.Invoke(sql);
        return new CommandDefinition(sql, parameters, transaction, cancellationToken: Cancellation);
    }
}
