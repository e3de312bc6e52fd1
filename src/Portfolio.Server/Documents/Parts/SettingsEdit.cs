using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Http;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Documents.Parts;

/// <summary>Replaces or patches the settings.</summary>
/// <param name="body">Replacing needs to say what is replaced; a patch need not.</param>
internal sealed class SettingsEdit(PartBody<SettingsJson> body, Preconditions conditions)
{
    public async Task<Draft> DrawAsync(DocumentState state)
    {
        var tag = state.Tag(PartNames.Settings);
        if ((body.NeedsStored ? conditions.OfChanging(tag) : conditions.OfReplacing(tag)) is { } refused)
            return refused;
        var stored = await state.BytesAsync(PartNames.Settings);
        var after = body.Over(stored);
        var faults = after.Faults.ToList();
        if (await FixedCurrency.CheckAsync(state.Head, stored, after.Content.Currency, after.Place("/currency")) is { } fixedFault)
            faults.Add(fixedFault);
        return new Draft { Settings = new(after.Content, after.Place), Faults = faults, Sent = body.Json };
    }
}
