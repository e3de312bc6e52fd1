using Microsoft.AspNetCore.Http.Extensions;
using Portfolio.Server.Contracts;

namespace Portfolio.Server.Http;

/// <summary>Lists come in pages: a limit, an opaque cursor, and the address of the next page in the body and as RFC 8288 link.</summary>
internal static class Paging
{
    public const int Most = 1_000;
    public const int Usual = 100;

    /// <summary>What to ask the store for: one more than the page holds tells whether there is another.</summary>
    public static int WithOneMore(int limit) =>
        limit is >= 1 and <= Most ? limit + 1 : throw QueryFaults.Of("limit", $"'limit' must be a whole number from 1 to {Most}.");

    /// <summary>A cursor that is a number; null for the first page.</summary>
    public static long? Number(string? cursor) =>
        cursor is null ? null
        : long.TryParse(cursor, System.Globalization.CultureInfo.InvariantCulture, out var number) ? number
        : throw QueryFaults.Of("cursor", "'cursor' is not one that this list gave.");

    /// <summary>A cursor that is a count from 0; 0 for the first page.</summary>
    public static int Count(string? cursor) =>
        Number(cursor) is not { } number ? 0
        : number is >= 0 and <= int.MaxValue / 2 ? (int)number
        : throw QueryFaults.Of("cursor", "'cursor' is not one that this list gave.");

    /// <summary>The page, with its link to the next.</summary>
    /// <param name="found">Up to one more than <paramref name="limit"/>.</param>
    /// <param name="cursorOf">Cursor after an item.</param>
    /// <param name="cursor">Name of the parameter that takes it.</param>
    public static PageJson<TJson> Page<T, TJson>(
        HttpResponse response, IReadOnlyList<T> found, int limit, Func<T, TJson> from, Func<T, string> cursorOf, string cursor = "cursor")
    {
        if (found.Count <= limit)
            return new PageJson<TJson> { Items = [.. found.Select(from)] };
        var next = cursorOf(found[limit - 1]);
        LinkNext(response, next, cursor);
        return new PageJson<TJson> { Items = [.. found.Take(limit).Select(from)], Next = next };
    }

    /// <summary>Links the page that begins after the cursor.</summary>
    public static void LinkNext(HttpResponse response, string next, string cursor = "cursor")
    {
        var request = response.HttpContext.Request;
        var query = new QueryBuilder(request.Query.Where(pair => pair.Key != cursor)) { { cursor, next } };
        response.Headers.Link = $"<{request.PathBase}{request.Path}{query}>; rel=\"next\"";
    }
}
