using Portfolio.Server.Audit;
using Portfolio.Server.Tests.Hosting;

namespace Portfolio.Server.Tests.Audit;

/// <summary>The command <c>verify-audit</c>, beside a server that is running and after it has ended.</summary>
public sealed class VerifyAuditTests : IDisposable
{
    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("portfolio-");

    private async Task<(int Code, string Said)> VerifyAsync()
    {
        var (output, errors) = (new StringWriter(), new StringWriter());
        var code = await VerifyAudit.RunAsync(["verify-audit", $"--Storage:Directory={folder.FullName}"], output, errors);
        return (code, (output.ToString() + errors).Trim());
    }

    private async Task WriteAsync()
    {
        await using var server = new PortfolioServer(folder.FullName);
        for (var i = 0; i < 4; i++)
            await server.Client().PutJsonAsync("/v1/portfolios/works/document", "{}");
        var head = (await (await server.Client().ReadAsync("/v1/audit?limit=1")).JsonAsync()).GetProperty("items")[0].GetProperty("hash").GetString();
        Assert.Equal((0, $"5 entries, chain whole, head {head}"), await VerifyAsync());
    }

    [Fact]
    public async Task AWholeChainIsFoundWholeWhileTheServerRunsAndAfterwards()
    {
        await WriteAsync();
        var (code, said) = await VerifyAsync();
        Assert.Equal(0, code);
        Assert.StartsWith("5 entries, chain whole, head ", said);
    }

    [Fact]
    public async Task ASingleLetterThatDiffersIsNamed()
    {
        await WriteAsync();
        var file = Path.Combine(folder.FullName, "portfolio.db");
        var bytes = await File.ReadAllBytesAsync(file, TestContext.Current.CancellationToken);
        var place = bytes.AsSpan().IndexOf("works/document"u8);
        bytes[place] ^= 1;
        await File.WriteAllBytesAsync(file, bytes, TestContext.Current.CancellationToken);
        var (code, said) = await VerifyAsync();
        Assert.Equal(1, code);
        Assert.Matches("^Entry [2-5] is missing or altered; the [1-4] before it are whole, head [0-9a-f]{64}$", said);
    }

    [Fact]
    public async Task WhereThereIsNothingToReadItSaysSo()
    {
        Assert.Equal((2, $"There is no database in '{folder.FullName}'."), await VerifyAsync());
        await File.WriteAllTextAsync(Path.Combine(folder.FullName, "portfolio.db"), new string('x', 5000), TestContext.Current.CancellationToken);
        Assert.Equal(2, (await VerifyAsync()).Code);
    }

    public void Dispose() => folder.Delete(recursive: true);
}
