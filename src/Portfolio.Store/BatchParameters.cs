using System.Data;
using System.Data.Common;
using System.Reflection;

namespace Portfolio.Store;

/// <summary>The members of a type as parameters of a statement in a batch, typed as <c>Dapper</c> types those of single statements.</summary>
internal static class BatchParameters<T>
{
    private static readonly (PropertyInfo Member, DbType Type)[] Members =
        [.. typeof(T).GetProperties().Select(member => (member, TypeOf(member.PropertyType)))];

    public static void Add(DbBatchCommand command, T values)
    {
        foreach (var (member, type) in Members)
        {
            var parameter = command.CreateParameter();
            parameter.ParameterName = member.Name;
            parameter.DbType = type;
            parameter.Value = member.GetValue(values) ?? DBNull.Value;
            command.Parameters.Add(parameter);
        }
    }

    private static DbType TypeOf(Type type) => (Nullable.GetUnderlyingType(type) ?? type) switch
    {
        var known when known == typeof(string) => DbType.String,
        var known when known == typeof(long) => DbType.Int64,
        var known when known == typeof(int) => DbType.Int32,
        var known when known == typeof(double) => DbType.Double,
        var known when known == typeof(byte[]) => DbType.Binary,
        _ => throw new NotSupportedException($"{typeof(T).Name}: a batch knows no parameters of type {type.Name}."),
    };
}
