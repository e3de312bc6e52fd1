using System.Text.Encodings.Web;
using System.Text.Json.Serialization;
using Portfolio.Server.Contracts;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.OpenApi;

/// <summary>The API's description, generated from the routes and contract types, and the JSON options that both go by.</summary>
internal static class ApiDescription
{
    public static void AddApiDescription(this IServiceCollection services)
    {
        services.ConfigureHttpJsonOptions(json =>
        {
            var options = json.SerializerOptions;
            options.TypeInfoResolverChain.Insert(0, ApiContext.Default);
            options.Converters.Add(new InstantConverter());
            options.UnmappedMemberHandling = JsonUnmappedMemberHandling.Disallow;
            options.AllowDuplicateProperties = false;
            options.NumberHandling = JsonNumberHandling.Strict;
            options.RespectNullableAnnotations = true;
            options.RespectRequiredConstructorParameters = true;
            options.DefaultIgnoreCondition = JsonIgnoreCondition.WhenWritingNull;
            options.Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping;
        });
        services.AddOpenApi(description =>
        {
            description.CreateSchemaReferenceId = SchemaNames.Of;
            description.AddDocumentTransformer(DescribeApi.Apply);
            description.AddOperationTransformer(DescribeCsv.Apply);
            description.AddOperationTransformer(DescribeDates.Apply);
            description.AddOperationTransformer(DescribeParameters.Apply);
            description.AddOperationTransformer(DescribeHeaders.Apply);
            description.AddOperationTransformer(DescribeRights.Apply);
            description.AddOperationTransformer(DescribeIdempotency.Apply);
            description.AddSchemaTransformer(DescribeTypes.Apply);
            description.AddDocumentTransformer(OpenAnswers.Apply);
        });
    }

    public static void MapApiDescription(this IEndpointRouteBuilder app) => app.MapOpenApi("/openapi.json").AllowAnonymous();
}
