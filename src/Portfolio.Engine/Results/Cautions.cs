namespace Portfolio.Engine.Results;

/// <summary>What a reader of a figure must know about it.</summary>
/// <param name="Code">Stable; never changes meaning.</param>
/// <param name="Message">A sentence that a planner understands.</param>
/// <param name="Subjects">The things it is about; empty when it is about all of them.</param>
public sealed record Warning(string Code, string Message, IReadOnlyList<string> Subjects);

/// <summary>The cautions that come with results whatever they are, and those that follow from the figures themselves.</summary>
public static class Cautions
{
    /// <summary>The cautions that every result carries.</summary>
    public static IReadOnlyList<Warning> Always { get; } =
    [
        new(CautionCodes.CoversWhatWasEntered, "The figures cover only what was entered: work, costs and risks that nobody stated are not in them.", []),
        new(CautionCodes.SamplingIsNotInput,
            "The sampling bounds say how exactly the stated inputs were worked through, not how good those inputs are.", []),
    ];

    /// <summary>
    /// The cautions of a contingency: those of every result, and one when the projects' own levels make less than the total.
    /// </summary>
    public static IReadOnlyList<Warning> Of(Contingency contingency) => contingency.Diversification >= 0 ? Always :
    [
        .. Always,
        new(CautionCodes.LevelsUnderAdd,
            $"At level {contingency.Level} the projects' own contingencies add up to less than the portfolio needs, "
            + "as they do when risks are rare: funding each project at its own level is not enough.",
            []),
    ];
}
