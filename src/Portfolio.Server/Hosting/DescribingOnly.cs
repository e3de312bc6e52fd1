using System.Reflection;
using Microsoft.Extensions.DependencyInjection.Extensions;

namespace Portfolio.Server.Hosting;

/// <summary>
/// The build starts the program to write down its API. Then nothing may work in the background and no storage is touched.
/// </summary>
internal static class DescribingOnly
{
    private const string DescribingTool = "GetDocument.Insider";

    public static void RestWhenDescribing(this WebApplicationBuilder builder)
    {
        if (Assembly.GetEntryAssembly()?.GetName().Name == DescribingTool)
            builder.Services.RemoveAll<IHostedService>();
    }
}
