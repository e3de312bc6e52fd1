using System.Net.Sockets;
using Npgsql;

namespace Portfolio.Store.Postgres;

/// <summary>Which failures lie with the server or the way to it, not with the statement (PostgreSQL manual, appendix A, error codes).</summary>
internal static class PostgresFailures
{
    public static bool IsUnavailable(Exception failure) => failure switch
    {
        PostgresException refused => IsUnavailable(refused.SqlState),
        // No connection, a broken one, none free in time, no answer in time.
        NpgsqlException or TimeoutException or SocketException => true,
        _ => false,
    };

    /// <summary>
    /// Whether a connection has ended, as one that was idle may have done unnoticed: what it had not begun to change can be asked again.
    /// </summary>
    public static bool IsBroken(Exception failure) =>
        failure is NpgsqlException { InnerException: IOException } or PostgresException { SqlState: "57P01" or "57P02" };

    private static bool IsUnavailable(string state) => state[..2] switch
    {
        // Connection; who may connect; no such database; room, memory, connections; stopped by an operator; input and output.
        "08" or "28" or "3D" or "53" or "57" or "58" => true,
        _ => state is
            "25006" /* read-only, such as a standby */ or "25P03" /* held a transaction too long */ or
            "40001" /* serialisation */ or "55000" /* lets nobody in */ or "40P01" /* deadlock */ or "55P03" /* lock not to be had */,
    };
}
