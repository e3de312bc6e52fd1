using Portfolio.Server.Tests.Contract;
using Portfolio.Server.Tests.Outside;

namespace Portfolio.Server.Tests.Fuzz;

/// <summary>What stands for the parameters of addresses and queries: mostly something that is there or means something.</summary>
internal sealed class FuzzNames
{
    private static readonly string[] Written = [.. Enumerable.Range(0, 16).Select(i => $"fuzz-{i % 4}"), "fuzz-old"];

    private readonly Dictionary<string, string[]> names;

    public FuzzNames(DescribedApi api, FuzzScene scene)
    {
        names = Of(scene);
        foreach (var operation in api.Operations)
            foreach (var parameter in operation.PathParameters)
                Assert.True(
                    names.ContainsKey(parameter),
                    $"{operation.Name} has a parameter '{parameter}' in its address: add what may stand for it to {nameof(FuzzNames)}.");
    }

    /// <summary>What stands for the parameters of one request's address, by name; they mostly belong together.</summary>
    public Dictionary<string, string> Address(DescribedOperation operation, Dice dice)
    {
        var chosen = new Dictionary<string, string>();
        foreach (var parameter in operation.PathParameters.OrderBy(parameter => parameter == "portfolio" ? 0 : 1))
        {
            var kind = chosen.GetValueOrDefault("portfolio", "").StartsWith("fuzz", StringComparison.Ordinal) ? "fuzz " : "";
            chosen[parameter] = dice.Chance(0.06) ? dice.Pick(NastyValues.Texts)
                : names.TryGetValue($"{operation.Name} {parameter}", out var own) ? dice.Pick(own)
                : parameter == "portfolio" ? Portfolio(operation, dice)
                : dice.Pick(names.GetValueOrDefault(kind + parameter, names[parameter]));
        }
        return chosen;
    }

    public string Value(string parameter, Dice dice) =>
        dice.Chance(0.06) || !names.TryGetValue(parameter, out var usual) ? dice.Pick(NastyValues.Texts) : dice.Pick(usual);

    public static string Escaped(string value) =>
        // The test's own client takes no null character in a path; what the server does with it is tested with sockets.
        Uri.EscapeDataString(value.Replace("\0", "", StringComparison.Ordinal));

    // Runs and their results are of one portfolio alone; the others are there to be written to.
    private string Portfolio(DescribedOperation operation, Dice dice)
    {
        var ofResults = operation.PathParameters.Contains("run") || operation.PathParameters.Contains("delivery");
        return dice.Pick(ofResults || (operation.Method == "GET" && dice.Chance(0.6)) ? names["portfolio"] : Written);
    }

    private static Dictionary<string, string[]> Of(FuzzScene scene) => new()
    {
        ["portfolio"] = [.. Enumerable.Repeat("works", 17), "fuzz-0", "fuzz-old", "absent"],
        ["archivePortfolio portfolio"] = ["fuzz-old", "absent"],
        ["run"] = [scene.Run, scene.Run, scene.Run, "latest", "latest", "01a2e092-1600-7dae-8e69-da9ed7b6b060"],
        ["cancelRun portfolio"] = ["fuzz-0"],
        ["cancelRun run"] = [.. scene.Waiting],
        ["number"] = ["1", "1", "2", "0"],
        ["programme"] = ["locks", "locks", "north"],
        ["project"] = ["weir", "quay"],
        ["fuzz project"] = ["project-0", "project-0", "project-1", "project-1", "nothing-yet", "new"],
        ["activity"] = ["M", "M", "A"],
        ["fuzz activity"] = ["A0", "A1", "A2", "first", "new"],
        ["key"] = [.. scene.KeyIds, "0123456789abcdef"],
        ["subscription"] = ["office", "office", "office", "office", "office", "other"],
        ["delivery"] = [scene.Delivery],
        ["scope"] = ["portfolio", "programme/locks", "project/weir", "milestone/weir/M"],
        ["metric"] = ["finish", "cost", "contingency"],
        ["level"] = ["80", "50", "82.5", "99.5", "12.25"],
        ["levels"] = ["80", "5,10,99.5"],
        ["bin"] = ["day", "week", "month", "10"],
        ["every"] = ["run", "day", "week", "month"],
        ["format"] = ["json", "csv"],
        ["asOf"] = ["2027-01-03", "2027-01-04", "2020-01-01"],
        ["from"] = ["2027-01-01", "2026-01-01"],
        ["to"] = ["2027-01-04", "2027-02-01"],
        ["limit"] = ["1", "10", "1000"],
        ["revision"] = ["1", "2", "3"],
        ["after"] = ["0", "1", "20"],
        ["state"] = ["delivered", "pending"],
        ["dryRun"] = ["true", "false"],
        ["action"] = ["document.put", "key.create"],
        ["actor"] = ["bootstrap"],
        ["note"] = ["Estimates of the week"],
    };
}
