using System.ComponentModel;

namespace Portfolio.Model.Faults;

/// <summary>Every code a fault can carry. A code never changes meaning; a new meaning gets a new code.</summary>
public static class FaultCodes
{
    // Shape: what the text of a member says.
    [Description("A member that is needed is missing; the path is its owner's.")]
    public const string MemberMissing = "member.missing";

    [Description("There is no such member here; names are told apart by case.")]
    public const string MemberUnknown = "member.unknown";

    [Description("The member is of another JSON kind than the one expected, such as a text where a number belongs.")]
    public const string MemberKind = "member.kind";

    [Description("The type of a distribution or a link is none of those that exist.")]
    public const string TypeUnknown = "type.unknown";

    [Description("The word is none of those that can stand here.")]
    public const string ValueUnknown = "value.unknown";

    [Description("The text is not a date of the form 2027-03-31.")]
    public const string DateFormat = "date.format";

    [Description("The number is too large to be read as one.")]
    public const string NumberNotFinite = "number.not-finite";

    [Description("A whole number is needed here.")]
    public const string NumberNotWhole = "number.not-whole";

    [Description("The amount has more decimals than its currency.")]
    public const string MoneyDecimals = "money.decimals";

    [Description("The member is reserved for later; leave it out.")]
    public const string Reserved = "member.reserved";

    // Text that is refused at once, at its first place (400).
    [Description("The text is not JSON; line and column say where reading stopped.")]
    public const string JsonMalformed = "json.malformed";

    [Description("The JSON is nested too deeply.")]
    public const string JsonDepth = "json.depth";

    [Description("A member stands twice in one object.")]
    public const string MemberDuplicate = "member.duplicate";

    // A pair of nodes that are not two.
    [Description("A pair names one node or more than two.")]
    public const string PairSize = "pair.size";

    // What only the engine's arithmetic can tell.
    [Description("No distribution of this type has the stated values at the stated percentiles.")]
    public const string DistributionEnds = "distribution.ends";

    [Description("The correlations and ranks contradict each other: no random numbers can keep all of them at once.")]
    public const string DependenceNotPositive = "dependence.not-positive";

    // An id that is not the one in the address, and what a patch cannot say.
    [Description("The id in the body is not the one in the address.")]
    public const string IdAddress = "id.address";

    [Description("The patch would mix members from before with new ones; send what is replaced with all its members.")]
    public const string MergeMixed = "merge.mixed";

    [Description("A patch cannot change a list in part; write each entry at its own address, or put the whole.")]
    public const string MergeList = "merge.list";

    // A member that the key's right does not reach (403).
    [Description("The key's right does not reach this member or project.")]
    public const string RightMissing = "right.missing";

    // Tables of updates: their columns, rows and cells.
    [Description("The table is not CSV that can be read.")]
    public const string TableMalformed = "table.malformed";

    [Description("Neither projects nor activities have a member with the name of this column.")]
    public const string ColumnUnknown = "column.unknown";

    [Description("The column stands twice in the header.")]
    public const string ColumnRepeated = "column.repeated";

    [Description("The column names a list, which a table cannot hold; send it as JSON.")]
    public const string ColumnList = "column.list";

    [Description("The row has more or fewer cells than the header.")]
    public const string RowCells = "row.cells";

    [Description("The column does not apply to what this row speaks of.")]
    public const string CellPlace = "cell.place";

    [Description("The cell does not hold what its column needs.")]
    public const string CellValue = "cell.value";

    [Description("Two cells of the row say different things about the same member.")]
    public const string CellConflict = "cell.conflict";

    // A parameter of the query that cannot be read or is out of range; the subject is its name.
    [Description("A parameter of the query cannot be read or is out of range; the subject is its name.")]
    public const string ParameterInvalid = "parameter.invalid";

    // What the history does not allow.
    [Description("The currency cannot change any more: runs were made in it.")]
    public const string CurrencyFixed = "currency.fixed";
}
