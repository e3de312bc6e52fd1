using System.Net.Mime;
using System.Text.Json;
using CloudNative.CloudEvents;
using CloudNative.CloudEvents.SystemTextJson;
using Microsoft.Extensions.Options;
using Portfolio.Server.Contracts.Events;
using Portfolio.Store.Outbox;

namespace Portfolio.Server.Events;

/// <summary>Events as CloudEvents 1.0: the same envelope for those who poll and for those who are called.</summary>
internal sealed class EventEnvelope(IOptions<EventOptions> options)
{
    private static readonly JsonEventFormatter Formatter = new();

    private readonly string prefix = options.Value.Source ?? "";

    /// <summary>One item of the feed.</summary>
    public EventJson Item(OutboxEvent told)
    {
        var envelope = Of(told);
        return new EventJson
        {
            SpecVersion = envelope.SpecVersion.VersionId,
            Id = envelope.Id!,
            Source = envelope.Source!.OriginalString,
            Type = envelope.Type!,
            Subject = envelope.Subject!,
            Time = envelope.Time!.Value,
            DataContentType = envelope.DataContentType!,
            Data = (JsonElement)envelope.Data!,
        };
    }

    /// <summary>The body of a delivery in structured JSON, with its media type.</summary>
    public (ReadOnlyMemory<byte> Bytes, ContentType Type) Body(OutboxEvent told)
    {
        var bytes = Formatter.EncodeStructuredModeMessage(Of(told), out var type);
        return (bytes, type);
    }

    private CloudEvent Of(OutboxEvent told) => new(CloudEventsSpecVersion.V1_0)
    {
        Id = told.Id,
        Source = new Uri($"{prefix}/v1/portfolios/{told.Portfolio}", UriKind.RelativeOrAbsolute),
        Type = EventTypes.Of(told.Kind),
        Subject = told.Subject,
        Time = told.At,
        DataContentType = MediaTypeNames.Application.Json,
        Data = JsonElement.Parse(told.Payload),
    };
}
