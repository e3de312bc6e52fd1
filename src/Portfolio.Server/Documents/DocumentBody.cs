using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents;

/// <summary>Answers with a document put together from the stored bytes of its parts, without parsing them.</summary>
internal sealed class DocumentBody(StoredDocument document) : IResult
{
    public async Task ExecuteAsync(HttpContext context)
    {
        var settings = document.Parts.FirstOrDefault(part => part.Project == PartNames.Settings);
        var projects = document.Parts.Where(part => part.Project != PartNames.Settings).ToList();
        context.Response.ContentType = "application/json; charset=utf-8";
        var body = context.Response.BodyWriter;
        if (settings is null)
        {
            // A key limited to projects sees no settings.
            Write("{"u8);
        }
        else
        {
            Write("{\"settings\":"u8);
            Write(settings.Bytes);
            Write(","u8);
        }
        Write("\"projects\":["u8);
        for (var i = 0; i < projects.Count; i++)
        {
            if (i > 0)
                Write(","u8);
            Write(projects[i].Bytes);
            await body.FlushAsync(context.RequestAborted);
        }
        Write("]}"u8);
        await body.FlushAsync(context.RequestAborted);

        void Write(ReadOnlySpan<byte> bytes) => System.Buffers.BuffersExtensions.Write(body, bytes);
    }
}
