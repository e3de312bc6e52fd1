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

    /// <summary>The first row, or null (the default) when there is none.</summary>
    internal Task<T?> FirstAsync<T>(
        string sql, object? parameters = null) => Connection.QueryFirstOrDefaultAsync<T>(Command(sql, parameters));

    internal async Task<List<T>> ListAsync<T>(string sql, object? parameters = null) =>
        [.. await Connection.QueryAsync<T>(Command(sql, parameters))];

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
