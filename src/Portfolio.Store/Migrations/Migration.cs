using System.Globalization;
using System.Reflection;
using System.Security.Cryptography;
using System.Text;

namespace Portfolio.Store.Migrations;

/// <summary>One numbered step of the schema. Steps only go forward and, once released, never change: their checksum is kept.</summary>
internal sealed record Migration(int Number, string Name, string Sql)
{
    public string Checksum => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(Sql)));

    /// <summary>All steps of this program for one database, by number, without gaps from 1.</summary>
    /// <param name="folder">Beside this file.</param>
    public static IReadOnlyList<Migration> Load(string folder)
    {
        var prefix = $"Portfolio.Store.Migrations.{folder}.";
        var assembly = Assembly.GetExecutingAssembly();
        var steps = assembly.GetManifestResourceNames().Where(name => name.StartsWith(prefix, StringComparison.Ordinal));
        return [.. steps.Order(StringComparer.Ordinal).Select(Read)];

        Migration Read(string resource)
        {
            using var reader = new StreamReader(assembly.GetManifestResourceStream(resource)!, Encoding.UTF8);
            var name = resource[prefix.Length..^".sql".Length];
            return new Migration(int.Parse(name[..4], CultureInfo.InvariantCulture), name, reader.ReadToEnd().ReplaceLineEndings("\n"));
        }
    }

    /// <summary>The steps that are still to be applied.</summary>
    /// <param name="applied">Checksums of those that have been, in their order.</param>
    /// <exception cref="StoreSchemaException">The stored steps are not this program's: a newer one wrote here, or one changed.</exception>
    public static IEnumerable<Migration> Missing(IReadOnlyList<Migration> known, IReadOnlyList<string> applied)
    {
        if (applied.Count > known.Count)
            throw new StoreSchemaException(
                $"The storage is at step {applied.Count}, this program knows {known.Count}: a newer version has written it.");
        foreach (var (migration, checksum) in known.Zip(applied))
        {
            if (checksum != migration.Checksum)
                throw new StoreSchemaException(
                    $"Step {migration.Number} ({migration.Name}) of the storage is not the one that this program would apply.");
        }
        return known.Skip(applied.Count);
    }
}
