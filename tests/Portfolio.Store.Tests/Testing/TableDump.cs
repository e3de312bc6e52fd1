using System.Data.Common;
using System.Globalization;
using System.Text;

namespace Portfolio.Store.Tests.Testing;

/// <summary>Every row of every table as text: two equal dumps are two equal databases.</summary>
internal static class TableDump
{
    public static Task<string> DumpAsync(this TestStore store) => DumpAsync(store.Place);

    public static async Task<string> DumpAsync(TestPlace place)
    {
        await using var connection = place.Connect();
        await connection.OpenAsync(TestStore.Cancellation);
        var dump = new StringBuilder();
        foreach (var table in await ReadAsync(connection, place.TablesSql))
            dump.AppendLine(table).AppendJoin('\n', await ReadAsync(connection, place.RowsSql(table.Trim('|')))).AppendLine();
        return dump.ToString();
    }

    private static async Task<List<string>> ReadAsync(DbConnection connection, string sql)
    {
        await using var command = connection.CreateCommand();
        command.CommandText = sql;
        await using var reader = await command.ExecuteReaderAsync(TestStore.Cancellation);
        var rows = new List<string>();
        while (await reader.ReadAsync(TestStore.Cancellation))
            rows.Add(string.Concat(Enumerable.Range(0, reader.FieldCount).Select(i => Text(reader.GetValue(i)) + "|")));
        return rows;
    }

    private static string Text(object value) =>
        value is byte[] bytes ? Convert.ToHexString(bytes) : Convert.ToString(value, CultureInfo.InvariantCulture) ?? "";
}
