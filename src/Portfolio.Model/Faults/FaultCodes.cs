namespace Portfolio.Model.Faults;

/// <summary>Every code a fault can carry. A code never changes meaning; a new meaning gets a new code.</summary>
public static class FaultCodes
{
    // Shape: what the text of a member says.
    public const string MemberMissing = "member.missing";
    public const string MemberUnknown = "member.unknown";
    public const string MemberKind = "member.kind";
    public const string TypeUnknown = "type.unknown";
    public const string ValueUnknown = "value.unknown";
    public const string DateFormat = "date.format";
    public const string NumberNotFinite = "number.not-finite";
    public const string NumberNotWhole = "number.not-whole";
    public const string MoneyDecimals = "money.decimals";
    public const string Reserved = "member.reserved";

    // Text that is refused at once, at its first place (400).
    public const string JsonMalformed = "json.malformed";
    public const string JsonDepth = "json.depth";
    public const string MemberDuplicate = "member.duplicate";

    // A pair of nodes that are not two.
    public const string PairSize = "pair.size";

    // What only the engine's arithmetic can tell.
    public const string DistributionEnds = "distribution.ends";
    public const string DependenceNotPositive = "dependence.not-positive";

    // An id that is not the one in the address, and what a patch cannot say.
    public const string IdAddress = "id.address";
    public const string MergeMixed = "merge.mixed";
    public const string MergeList = "merge.list";

    // A member that the key's right does not reach (403).
    public const string RightMissing = "right.missing";

    // Tables of updates: their columns, rows and cells.
    public const string TableMalformed = "table.malformed";
    public const string ColumnUnknown = "column.unknown";
    public const string ColumnRepeated = "column.repeated";
    public const string ColumnList = "column.list";
    public const string RowCells = "row.cells";
    public const string CellPlace = "cell.place";
    public const string CellValue = "cell.value";
    public const string CellConflict = "cell.conflict";

    // A parameter of the query that cannot be read or is out of range; the subject is its name.
    public const string ParameterInvalid = "parameter.invalid";

    // What the history does not allow.
    public const string CurrencyFixed = "currency.fixed";
}
