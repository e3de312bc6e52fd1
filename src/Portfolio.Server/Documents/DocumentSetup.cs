using Microsoft.Extensions.Options;
using Portfolio.Server.Contracts.Document;
using Portfolio.Server.Hosting;

namespace Portfolio.Server.Documents;

internal static class DocumentSetup
{
    public static void AddDocuments(this IServiceCollection services)
    {
        services.AddSingleton(provider => new DocumentReader(provider.GetRequiredService<IOptions<LimitOptions>>().Value.JsonDepth));
        services.AddSingleton(provider => new DocumentCheck(provider.GetRequiredService<IOptions<LimitOptions>>().Value.OfModel()));
        services.AddSingleton(provider => new KnownParts(provider.GetRequiredService<IOptions<LimitOptions>>().Value.OfModel()));
        services.AddSingleton(provider => new DraftCheck(
            provider.GetRequiredService<IOptions<LimitOptions>>().Value.OfModel(), provider.GetRequiredService<KnownParts>()));
        services.AddSingleton<PartWriting>();
        services.AddSingleton<ProjectList>();
        services.AddSingleton<RevisionChanges>();
        services.AddSingleton<RevisionOfDate>();
    }
}
