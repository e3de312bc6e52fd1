namespace Portfolio.Engine.Results;

/// <summary>
/// Sampling error of a figure that has no distribution-free interval, such as a share or a difference of two runs with the same draws:
/// the iterations are cut into 20 sections of consecutive ones and the figure is worked out in each (batch means; Law, <i>Simulation
/// Modeling and Analysis</i>, 5th ed. (2015), section 9.5.3).
/// </summary>
public static class SectionError
{
    /// <summary>Sections a run is cut into.</summary>
    public const int Sections = 20;

    /// <summary>97.5 % point of Student's t with 19 degrees of freedom.</summary>
    private const double T = 2.093;

    /// <summary>Half the width of the 95 % interval: 2.093·s/√20, s² = Σ (section − overall)² / 19.</summary>
    /// <param name="overall">The figure over all iterations.</param>
    /// <param name="sections">The figure in each of the 20 sections.</param>
    public static double Of(double overall, ReadOnlySpan<double> sections)
    {
        if (sections.Length != Sections) throw new ArgumentException("There are 20 sections.", nameof(sections));
        var squares = 0.0;
        foreach (var section in sections) squares += (section - overall) * (section - overall);
        return T * Math.Sqrt(squares / (Sections - 1)) / Math.Sqrt(Sections);
    }

    /// <summary>The iterations of a section, equal in number but for one. Fewer than 20 iterations have no sections.</summary>
    public static Range Of(int section, int iterations) =>
        (int)((long)section * iterations / Sections)..(int)((section + 1L) * iterations / Sections);
}
