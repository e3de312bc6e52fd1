using System.ComponentModel;
using System.Reflection;
using Portfolio.Engine.Results;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Problems;

/// <summary>A code that a fault or a caution can carry, with the sentence that stands beside it in the source.</summary>
internal sealed record CodeMeaning(string Code, string Meaning);

/// <summary>
/// All codes of faults and of cautions, collected from the static classes named <c>…Codes</c>, so that none can be left out. In the order
/// of the alphabet; a code that several classes share stands here once.
/// </summary>
internal static class CodeMeanings
{
    public static IReadOnlyList<CodeMeaning> OfFaults { get; } = [.. In(typeof(FaultCodes).Assembly, typeof(CodeMeanings).Assembly)];

    public static IReadOnlyList<CodeMeaning> OfCautions { get; } = [.. In(typeof(CautionCodes).Assembly)];

    private static IEnumerable<CodeMeaning> In(params Assembly[] assemblies) => assemblies.SelectMany(assembly => assembly.GetTypes())
        .Where(type => type is { IsAbstract: true, IsSealed: true } && type.Name.EndsWith("Codes", StringComparison.Ordinal))
        .SelectMany(type => type.GetFields(BindingFlags.Public | BindingFlags.Static))
        .Where(field => field.IsLiteral && field.FieldType == typeof(string))
        .Select(code => new CodeMeaning(
            (string)code.GetRawConstantValue()!, code.GetCustomAttribute<DescriptionAttribute>()?.Description ?? ""))
        .Distinct().OrderBy(code => code.Code, StringComparer.Ordinal);
}
