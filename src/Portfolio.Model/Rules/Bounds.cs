namespace Portfolio.Model.Rules;

/// <summary>Bounds that no installation changes, because dates, minutes and money in doubles must stay exact within them.</summary>
public static class Bounds
{
    public static readonly DateOnly FirstDate = new(1970, 1, 1);

    public static readonly DateOnly LastDate = new(2199, 12, 31);

    /// <summary>Working days of a duration, delay or lag; 230 years have 84,006 days, so anything larger is a slip of the
    /// keyboard.</summary>
    public const double WorkingDays = 100_000;

    /// <summary>Units of the currency in one stated amount; times 100 this is still below 2⁵³, where doubles stop being exact.</summary>
    public const double Money = 1e13;

    /// <summary>Largest factor of a driver.</summary>
    public const double Factor = 1_000;

    /// <summary>Units of a pool.</summary>
    public const double Units = 1e9;

    /// <summary>Largest rank correlation that a background or a project may state.</summary>
    public const double Correlation = 0.99;

    /// <summary>Largest weight of a PERT; beyond it the curve is a spike and its quantiles lose their digits.</summary>
    public const double PertWeight = 1e4;

    /// <summary>How far a sum of probabilities may be from 1.</summary>
    public const double ProbabilityTolerance = 1e-9;

    /// <summary>2⁵³ − 1: the largest whole number that every JSON reader keeps.</summary>
    public const long Seed = 9_007_199_254_740_991;

    public const int NameLength = 200;
}
