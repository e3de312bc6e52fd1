using System.Reflection;
using System.Xml.Linq;

namespace Portfolio.Server.Tests;

/// <summary>
/// Arrows that must not exist: project references by what the built assemblies refer to, the rest by what the sources name.
/// </summary>
public class ArrowTests
{
    [Theory]
    [InlineData("Portfolio.Model", "Portfolio.", "Dapper", "Microsoft.", "Hangfire", "MathNet")]
    [InlineData("Portfolio.Engine", "Portfolio.Store", "Portfolio.Server", "Dapper", "Microsoft.", "Hangfire", "Npgsql")]
    [InlineData("Portfolio.Store", "Portfolio.Engine", "Portfolio.Server", "Microsoft.AspNetCore", "Hangfire", "MathNet")]
    public void AnAssemblyRefersToNothingAboveIt(string assembly, params string[] forbidden)
    {
        var references = Assembly.Load(assembly).GetReferencedAssemblies().Select(a => a.Name!).ToArray();
        Assert.NotEmpty(references);
        Assert.DoesNotContain(references, name => forbidden.Any(f => name.StartsWith(f, StringComparison.Ordinal)));
    }

    [Theory]
    [InlineData("Endpoints", "Portfolio.Engine.Runs")]
    [InlineData("Endpoints", "Plan.Compile")]
    [InlineData("Endpoints", "Hangfire")]
    [InlineData("Jobs", "Microsoft.AspNetCore")]
    [InlineData("Contracts", "Portfolio.Store.Sqlite")]
    public void AFolderOfTheServerDoesNotName(string folder, string forbidden)
    {
        var files = Directory.GetFiles(Path.Combine(Repository.Root, "src", "Portfolio.Server", folder), "*.cs", SearchOption.AllDirectories);
        Assert.NotEmpty(files);
        Assert.DoesNotContain(files, file => File.ReadAllText(file).Contains(forbidden, StringComparison.Ordinal));
    }

    [Fact]
    public void TheModelHasNoPackages()
    {
        var project = XDocument.Load(Path.Combine(Repository.Root, "src", "Portfolio.Model", "Portfolio.Model.csproj"));
        Assert.Empty(project.Descendants("PackageReference"));
        Assert.Empty(project.Descendants("ProjectReference"));
    }
}
