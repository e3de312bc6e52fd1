using System.ComponentModel;

namespace Portfolio.Engine.Results;

/// <summary>Codes of <see cref="Warning"/>; they never change their meaning.</summary>
public static class CautionCodes
{
    [Description("The figures cover only what was entered.")]
    public const string CoversWhatWasEntered = "covers.entered-only";

    [Description("The sampling bounds do not say how good the estimates are.")]
    public const string SamplingIsNotInput = "sampling.not-input";

    [Description("Nothing was stated about how projects move together, so they are taken as independent.")]
    public const string NotStated = "dependence.not-stated";

    [Description("Dependence is stated for projects that it cannot reach, because their own correlation is 0.")]
    public const string NoEffect = "dependence.no-effect";

    [Description("The stated ranks contradicted each other and were replaced by the nearest that can exist together.")]
    public const string Repaired = "dependence.repaired";

    [Description("Activities start later when they get shorter, and what follows their start may become later too.")]
    public const string Reverse = "schedule.reverse";

    [Description("The progress of projects was reported long before the date of the run.")]
    public const string StaleStatus = "status.stale";

    [Description("Some iterations finish after the last date there is; they are counted on that day.")]
    public const string DatesClamped = "dates.clamped";

    [Description("At a level the projects' own contingencies add up to less than the portfolio needs.")]
    public const string LevelsUnderAdd = "levels.under-add";
}
