using System.Text.Json;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Portfolios;

/// <summary>One place that a revision changed.</summary>
public sealed record ChangeJson
{
    /// <summary>
    /// RFC 6901 pointer into the document, in which every list of things with ids is taken as an object by id:
    /// <c>/projects/weir-lock/activities/A10/duration/mode</c>. Other lists are compared whole. A new order of things that stay is one change
    /// of their list, from ids to ids.
    /// </summary>
    public required string Path { get; init; }

    /// <summary>Absent: it was not there.</summary>
    public JsonElement? Old { get; init; }

    /// <summary>Absent: it is there no longer.</summary>
    public JsonElement? New { get; init; }

    internal static ChangeJson From(JsonChange change) => new() { Path = change.Path, Old = change.Old, New = change.New };
}
