using System.Numerics;
using System.Runtime.InteropServices;

namespace Portfolio.Engine.Results;

/// <summary>
/// The iterations of several projects taken together: a programme, a tag, the portfolio. Iteration by iteration the latest finish and
/// the sum of costs. Projects are added in document order; those without activities are not added at all. Not safe to share while adding.
/// </summary>
public sealed class ScopeSamples
{
    private readonly int[] finishes;
    private readonly double[] costs;

    /// <summary>No project yet: nothing finishes, nothing costs.</summary>
    public ScopeSamples(int iterations)
    {
        finishes = new int[iterations];
        costs = new double[iterations];
        Array.Fill(finishes, Instants.Never);
    }

    /// <summary>Projects added so far.</summary>
    public int Projects { get; private set; }

    /// <summary>Minutes, one for each iteration.</summary>
    public ReadOnlySpan<int> Finishes => finishes;

    /// <summary>Whole minor units, one for each iteration.</summary>
    public ReadOnlySpan<double> Costs => costs;

    /// <summary>Sum of the projects' means, each rounded to the minor unit.</summary>
    public long MeanOfParts { get; private set; }

    /// <summary>Adds one project.</summary>
    /// <param name="projectFinishes">Minutes, one for each iteration.</param>
    /// <param name="projectCosts">Whole minor units, in the same order.</param>
    /// <param name="roundedMean">The project's mean cost in minor units, as its own grid has it.</param>
    /// <exception cref="ArgumentException">Another number of iterations.</exception>
    public void Add(ReadOnlySpan<int> projectFinishes, ReadOnlySpan<double> projectCosts, long roundedMean)
    {
        if (projectFinishes.Length != finishes.Length || projectCosts.Length != costs.Length)
            throw new ArgumentException("Every project has the same number of iterations.");
        Later(finishes, projectFinishes);
        Plus(costs, projectCosts);
        MeanOfParts += roundedMean;
        Projects++;
    }

    private static void Later(Span<int> to, ReadOnlySpan<int> from)
    {
        var whole = MemoryMarshal.Cast<int, Vector<int>>(to);
        var added = MemoryMarshal.Cast<int, Vector<int>>(from);
        for (var i = 0; i < whole.Length; i++) whole[i] = Vector.Max(whole[i], added[i]);
        for (var i = whole.Length * Vector<int>.Count; i < to.Length; i++) to[i] = Math.Max(to[i], from[i]);
    }

    // Each element is one sum of whole numbers below 2⁵³, so the width of the vectors changes no bit.
    private static void Plus(Span<double> to, ReadOnlySpan<double> from)
    {
        var whole = MemoryMarshal.Cast<double, Vector<double>>(to);
        var added = MemoryMarshal.Cast<double, Vector<double>>(from);
        for (var i = 0; i < whole.Length; i++) whole[i] += added[i];
        for (var i = whole.Length * Vector<double>.Count; i < to.Length; i++) to[i] += from[i];
    }
}
