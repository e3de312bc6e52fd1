namespace Portfolio.Server.Demo.Start;

/// <summary>Where to look next.</summary>
/// <param name="Root">Address of the server, such as <c>http://127.0.0.1:5080</c>.</param>
/// <param name="KeyFile">File that holds the first key; null when the key was given by configuration.</param>
internal sealed record DemoAddresses(string Root, string? KeyFile)
{
    public string Render()
    {
        var portfolio = $"{Root}/v1/portfolios/{DemoPosting.Id}";
        var key = KeyFile is null ? "YOUR-KEY" : $"$(cat {KeyFile})";
        return $"""
            document     {portfolio}/document
            results      {portfolio}/runs/latest/results
            series       {portfolio}/series?scope=portfolio&metric=finish&level=80
            contingency  {portfolio}/contingency?level=80
            health       {Root}/health/ready

            curl -H "Authorization: Bearer {key}" "{portfolio}/runs/latest/results/portfolio"

            """;
    }
}
