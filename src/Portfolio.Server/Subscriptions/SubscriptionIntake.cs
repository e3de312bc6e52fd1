using System.Security.Cryptography;
using System.Text.Json;
using Microsoft.Extensions.Options;
using Microsoft.Net.Http.Headers;
using Portfolio.Engine.Results;
using Portfolio.Model.Faults;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Json;
using Portfolio.Server.Contracts.Subscriptions;
using Portfolio.Server.Http;
using Portfolio.Server.Problems;
using Portfolio.Server.Results;
using Portfolio.Server.Webhooks;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;
using Portfolio.Store.Subscriptions;

namespace Portfolio.Server.Subscriptions;

/// <summary>Takes subscriptions that were sent: checks them against what runs keep, and makes their secrets.</summary>
internal sealed class SubscriptionIntake(
    SubscriptionStore subscriptions, DocumentStore documents, TargetRule targets, TimeProvider clock, IOptions<WebhookOptions> options)
{
    private const int MostOverlapHours = 168;

    /// <exception cref="RequestRefused">Something is wrong with it.</exception>
    public async Task<(SubscriptionResult Result, string Secret)> CreateAsync(
        Caller caller, string portfolio, SubscriptionRequestJson sent, SubscriptionJoining? joining,
        CancellationToken cancellation)
    {
        var asked = await CheckedAsync(portfolio, sent, null, cancellation);
        var secret = WebhookSecrets.New();
        var id = asked.Id ?? Guid.CreateVersion7(clock.GetUtcNow()).ToString();
        var most = options.Value.Subscriptions;
        return (await subscriptions.CreateAsync(caller, portfolio, id, asked.Content, secret, most, joining, cancellation), secret);
    }

    /// <exception cref="RequestRefused">Something is wrong with it.</exception>
    public async Task<SubscriptionResult> ReplaceAsync(
        Caller caller, string portfolio, string id, SubscriptionRequestJson sent, Preconditions conditions, SubscriptionJoining? joining,
        CancellationToken cancellation)
    {
        var asked = await CheckedAsync(portfolio, sent, id, cancellation);
        return await subscriptions.ReplaceAsync(
            caller, portfolio, id, asked.Content, found => conditions.OfReplacing(TagOf(found)), joining, cancellation);
    }

    /// <exception cref="RequestRefused">The overlap is out of range.</exception>
    public async Task<(SubscriptionResult Result, string Secret)> RotateAsync(
        Caller caller, string portfolio, string id, SecretRequestJson? sent, Preconditions conditions,
        SubscriptionJoining? joining, CancellationToken cancellation)
    {
        var hours = sent?.OverlapHours ?? options.Value.SecretOverlapHours;
        if (hours is < 0 or > MostOverlapHours)
        {
            var range = $"'overlapHours' must be from 0 to {MostOverlapHours}.";
            throw new RequestRefused(
                Problem.Refused([new Fault("/overlapHours", "subscription", SubscriptionCodes.OutOfRange, range)]));
        }
        var secret = WebhookSecrets.New();
        var overlap = TimeSpan.FromHours((double)hours);
        var result = await subscriptions.RotateAsync(
            caller, portfolio, id, secret, overlap, found => conditions.OfChanging(TagOf(found)), joining, cancellation);
        return (result, secret);
    }

    /// <summary>A strong tag of what GET answers.</summary>
    public static EntityTagHeaderValue TagOf(StoredSubscription stored)
    {
        var text = JsonSerializer.SerializeToUtf8Bytes(SubscriptionJson.From(stored), ApiContext.Default.SubscriptionJson);
        return EntityTags.OfPart(Convert.ToHexStringLower(SHA256.HashData(text)));
    }

    public static Problem Refusal(SubscriptionResult result) => result.Outcome switch
    {
        SubscriptionOutcome.Refused => (Problem)result.Refusal!,
        SubscriptionOutcome.Forbidden => Problem.Forbidden(),
        SubscriptionOutcome.Archived => Problem.Conflict(
            "archived", "The portfolio is archived", "It can be read, but its subscriptions can no longer be changed."),
        SubscriptionOutcome.Exists => Problem.Conflict(
            "exists", "There is one with this id", "PUT replaces what a subscription says; another id makes another."),
        SubscriptionOutcome.TooMany => Problem.Conflict(
            "too-many-subscriptions", "The portfolio has too many subscriptions", "Remove one that is no longer needed."),
        _ => Problem.NotFound("There is no such portfolio or subscription."),
    };

    private async Task<SubscriptionRequest> CheckedAsync(
        string portfolio, SubscriptionRequestJson sent, string? address, CancellationToken cancellation)
    {
        var asked = SubscriptionRequest.Of(sent, address, targets, await KeptLevelsAsync(portfolio, cancellation));
        return asked.Faults.Count == 0 ? asked : throw new RequestRefused(Problem.Refused(asked.Faults));
    }

    private async Task<IReadOnlyCollection<Level>> KeptLevelsAsync(string portfolio, CancellationToken cancellation)
    {
        var part = await documents.ReadPartAsync(Caller.System, portfolio, PartNames.Settings, null, cancellation);
        return part is null ? Level.Kept
            : [.. RunLevels.Kept(DocumentReader.OfStored.ReadSettings(part.Bytes).ToModel(new Reading(), "/settings"))];
    }
}
