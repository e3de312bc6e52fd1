namespace Portfolio.Server.Demo.Course;

/// <summary>A number in [0, 1) that belongs to a text: the invented luck of the demo, the same on every machine and day.</summary>
internal static class Chance
{
    private const double Steps = 1L << 53;

    public static double Of(string key)
    {
        // FNV-1a over the characters (Fowler, Noll and Vo), then the finalizer of splitmix64 (Steele, Lea and Flood 2014), so that
        // similar keys part.
        var hash = 0xcbf29ce484222325UL;
        foreach (var letter in key)
            hash = (hash ^ letter) * 0x100000001b3UL;
        hash = (hash ^ (hash >> 30)) * 0xbf58476d1ce4e5b9UL;
        hash = (hash ^ (hash >> 27)) * 0x94d049bb133111ebUL;
        return ((hash ^ (hash >> 31)) >> 11) / Steps;
    }

    public static double Between(string key, double low, double high) => low + ((high - low) * Of(key));
}
