namespace Portfolio.Engine.Results;

/// <summary>
/// Being on time and within budget in the same iterations (joint confidence level; NASA Cost Estimating Handbook 4.0 (2015), appendix J).
/// </summary>
/// <param name="Finish">The promised date.</param>
/// <param name="Budget">The promised budget in minor units.</param>
/// <param name="Kept">Iterations that keep both.</param>
/// <param name="Iterations">All iterations.</param>
public sealed record JointConfidence(DateOnly Finish, long Budget, int Kept, int Iterations)
{
    /// <summary>0–1.</summary>
    public double Probability => (double)Kept / Iterations;

    /// <summary>Counts the iterations that keep both promises.</summary>
    /// <param name="finishes">Minutes, one for each iteration.</param>
    /// <param name="costs">Minor units, one for each iteration, in the same order.</param>
    /// <param name="finish">The promised date.</param>
    /// <param name="budget">The promised budget in minor units.</param>
    public static JointConfidence Of(ReadOnlySpan<int> finishes, ReadOnlySpan<double> costs, DateOnly finish, long budget)
    {
        var day = Instants.ToDay(finish);
        var kept = 0;
        for (var i = 0; i < finishes.Length; i++)
            if (costs[i] <= budget && Instants.DayEndingAt(finishes[i]) <= day) kept++;
        return new(finish, budget, kept, finishes.Length);
    }
}
