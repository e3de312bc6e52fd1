using Portfolio.Server.Access;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Contracts.Portfolios;
using Portfolio.Server.Documents.Parts;
using Portfolio.Server.OpenApi;
using Portfolio.Server.Problems;
using Portfolio.Store.Access;
using Portfolio.Store.Documents;

namespace Portfolio.Server.Endpoints;

internal static class SettingsEndpoints
{
    public static void MapSettings(this IEndpointRouteBuilder portfolio)
    {
        var settings = portfolio.MapGroup("/settings").WithTags("Parts");
        settings.MapGet("", Get).WithName("getSettings").Needs(Right.Read)
            .Produces<SettingsJson>().ReadsConditionally().Refuses(422);
        settings.MapPut("", Put).WithName("putSettings").Needs(Right.Manage)
            .Accepts<SettingsJson>("application/json")
            .Produces<WrittenJson>().ReplacesConditionally().Refuses(409, 412, 413, 415, 422, 428);
        settings.MapPatch("", Patch).WithName("patchSettings").Needs(Right.Manage)
            .AcceptsPatch().Produces<WrittenJson>().ChangesConditionally().Refuses(409, 412, 413, 415, 422);
    }

    /// <summary>The settings as they were sent, defaults not filled in.</summary>
    internal static async Task<IResult> Get([AsParameters] PartRead read)
    {
        var part = await read.FindAsync(PartNames.Settings);
        return Read.Part(read.Http, part.Hash, part.Bytes);
    }

    /// <summary>Replaces the settings; refused while projects use what would be gone.</summary>
    internal static Task<IResult> Put([AsParameters] PartWrite write) => Change(write, "settings.put");

    /// <summary>Changes members of the settings. Calendars, pools, drivers and events are replaced with the whole.</summary>
    internal static Task<IResult> Patch([AsParameters] PartWrite write) => Change(write, "settings.patch");

    private static async Task<IResult> Change(PartWrite write, string action)
    {
        using var body = await write.BodyAsync();
        var edit = new SettingsEdit(write.Settings(body), write.Conditions);
        return await write.ToAsync(PartNames.Settings, action, Right.Manage, edit.DrawAsync);
    }
}
