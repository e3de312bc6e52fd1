using System.ComponentModel;
using System.Reflection;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Problems;

/// <summary>A code that a fault can carry, with the sentence that stands beside it in the source.</summary>
internal sealed record CodeMeaning(string Code, string Meaning);

/// <summary>All codes of faults, collected from the static classes named <c>…Codes</c>, so that none can be left out.</summary>
internal static class CodeMeanings
{
    /// <summary>In the order of the alphabet; a code that several classes share stands here once.</summary>
    public static IReadOnlyList<CodeMeaning> All { get; } =
    [
        .. Constants().Select(code => new CodeMeaning(
                (string)code.GetRawConstantValue()!, code.GetCustomAttribute<DescriptionAttribute>()?.Description ?? ""))
            .Distinct().OrderBy(code => code.Code, StringComparer.Ordinal),
    ];

    private static IEnumerable<FieldInfo> Constants() =>
        new[] { typeof(FaultCodes).Assembly, typeof(CodeMeanings).Assembly }.SelectMany(assembly => assembly.GetTypes())
            .Where(type => type is { IsAbstract: true, IsSealed: true } && type.Name.EndsWith("Codes", StringComparison.Ordinal))
            .SelectMany(type => type.GetFields(BindingFlags.Public | BindingFlags.Static))
            .Where(field => field.IsLiteral && field.FieldType == typeof(string));
}
