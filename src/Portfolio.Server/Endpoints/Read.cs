using Microsoft.Net.Http.Headers;
using Portfolio.Server.Documents;
using Portfolio.Server.Http;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

/// <summary>Answers to reads that carry an entity tag.</summary>
internal static class Read
{
    public static IResult NotModified(HttpContext http, EntityTagHeaderValue tag)
    {
        http.Response.GetTypedHeaders().ETag = tag;
        return TypedResults.StatusCode(StatusCodes.Status304NotModified);
    }

    /// <summary>The document, and in <c>Content-Location</c> the address at which this revision stays.</summary>
    public static IResult Document(HttpContext http, StoredDocument document)
    {
        http.Response.GetTypedHeaders().ETag = EntityTags.OfDocument(document.Parts.Select(part => new PartHead(part.Project, part.Hash)));
        http.Response.Headers.ContentLocation = $"{http.Request.Path}?revision={document.Revision.Number}";
        return new DocumentBody(document);
    }

    /// <summary>A part by its stored bytes; 304 when the client has it already.</summary>
    public static IResult Part(HttpContext http, string hash, byte[] bytes)
    {
        var tag = EntityTags.OfPart(hash);
        return new Preconditions(http.Request).HasAlready(tag)
            ? NotModified(http, tag)
            : TypedResults.Bytes(bytes, "application/json; charset=utf-8", entityTag: tag);
    }
}
