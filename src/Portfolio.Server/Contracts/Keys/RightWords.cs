using Portfolio.Server.Contracts.Json;
using Portfolio.Store.Access;

namespace Portfolio.Server.Contracts.Keys;

/// <summary>Rights in the words of the API.</summary>
internal static class RightWords
{
    public static readonly Words<Right> All = new(
        ("read", Right.Read), ("submit", Right.Submit), ("manage", Right.Manage), ("finance", Right.Finance), ("admin", Right.Admin));

    public static string Of(Right right) => All.All[(int)right];
}
