using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Documents.Parts;
using Portfolio.Server.Http;

namespace Portfolio.Server.Endpoints;

/// <summary>Bodies of requests for one part: what a PUT states whole and what a PATCH changes.</summary>
internal static class PartBodies
{
    public const string Patch = "application/merge-patch+json";

    public static PartBody<SettingsJson> Settings(this PartWrite write, RequestBody body) =>
        Of(write, body, PartTypes.Settings, "", "settings");

    public static PartBody<ProjectJson> Project(this PartWrite write, RequestBody body, string project) =>
        Of(write, body, PartTypes.Project, project, project);

    public static PartBody<ActivityJson> Activity(this PartWrite write, RequestBody body, string project, string activity) =>
        Of(write, body, PartTypes.Activity, activity, $"{project}/{activity}");

    private static PartBody<T> Of<T>(PartWrite write, RequestBody body, PartType<T> type, string id, string subject) =>
        HttpMethods.IsPatch(write.Http.Request.Method)
            ? new PatchBody<T>(body.Bytes, write.Reader, type, id, subject)
            : new WholeBody<T>(body.Bytes, write.Reader, type, id, subject);
}
