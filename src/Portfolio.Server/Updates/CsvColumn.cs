using System.Text.Json.Serialization.Metadata;
using Portfolio.Server.Contracts.Document;

namespace Portfolio.Server.Updates;

/// <summary>What the cells of a column hold.</summary>
internal enum CellKind
{
    /// <summary>No such member.</summary>
    None,
    Text,
    Number,
    Flag,
    /// <summary>An object whose members have columns of their own: only <c>null</c> can stand here.</summary>
    Whole,
    /// <summary>A list, which a cell cannot hold.</summary>
    List,
}

/// <summary>A column by the dotted name in its header.</summary>
internal sealed record CsvColumn(string Name)
{
    public const string Project = "project";
    public const string Activity = "activity";
    public const string Create = "create";

    /// <summary>The steps to the member.</summary>
    public IReadOnlyList<string> Path { get; } = Name.Split('.');

    public CellKind OfProject { get; } = KindIn(DocumentReader.ProjectType, Name.Split('.'));

    public CellKind OfActivity { get; } = KindIn(DocumentReader.ActivityType, Name.Split('.'));

    /// <summary>One of those that say what a row speaks of.</summary>
    public bool IsKey => Name is Project or Activity or Create;

    private static CellKind KindIn(JsonTypeInfo owner, ReadOnlySpan<string> path)
    {
        var step = path[0];
        // Names of things are in the key columns.
        if (step == "id" || owner.Properties.FirstOrDefault(property => property.Name == step) is not { } member)
            return CellKind.None;
        var type = Nullable.GetUnderlyingType(member.PropertyType) ?? member.PropertyType;
        if (type == typeof(DistributionJson))
            return OfDistribution(path[1..]);
        if (type == typeof(IReadOnlyDictionary<string, string>))
            return path.Length switch { 1 => CellKind.Whole, 2 => CellKind.Text, _ => CellKind.None };
        var kind = owner.Options.GetTypeInfo(type).Kind;
        if (kind == JsonTypeInfoKind.Object)
            return path.Length == 1 ? CellKind.Whole : KindIn(owner.Options.GetTypeInfo(type), path[1..]);
        if (kind == JsonTypeInfoKind.Enumerable)
            return CellKind.List;
        return path.Length > 1 ? CellKind.None : OfPlain(type);
    }

    private static CellKind OfDistribution(ReadOnlySpan<string> path) => path switch
    {
        [] => CellKind.Number,
        ["type"] => CellKind.Text,
        ["points" or "outcomes"] => CellKind.List,
        [var number] when DistributionForm.Names.Contains(number) => CellKind.Number,
        _ => CellKind.None,
    };

    private static CellKind OfPlain(Type type) =>
        type == typeof(string) ? CellKind.Text
        : type == typeof(bool) ? CellKind.Flag
        : type == typeof(double) || type == typeof(decimal) ? CellKind.Number
        : CellKind.None;
}
