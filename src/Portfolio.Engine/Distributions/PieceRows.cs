using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Portfolio.Engine.Draws;

namespace Portfolio.Engine.Distributions;

/// <summary>A value read from <see cref="ScorePieces"/> where these reach, eight scores at a time.</summary>
internal interface IPiecewise
{
    /// <summary>Values at scores between ±<see cref="ScorePieces.Reach"/>.</summary>
    Vector512<double> Within(Vector512<double> scores);

    /// <summary>Values at all scores, of which those that <paramref name="beyond"/> marks lie outside.</summary>
    Vector512<double> Everywhere(Vector512<double> scores, Vector512<double> beyond);
}

/// <summary>
/// Reads rows. The quick loop stops at the first eight scores of which one lies outside, so that no call stands in it and all it needs
/// stays in registers. What a lane gives does not depend on its neighbours.
/// </summary>
internal static class PieceRows
{
    /// <summary>Writes the values at the scores; <paramref name="values"/> is at least as long and may be the same span.</summary>
    public static void Read<TPiecewise>(TPiecewise function, ReadOnlySpan<double> scores, Span<double> values)
        where TPiecewise : struct, IPiecewise, allows ref struct
    {
        values = values[..scores.Length];
        var whole = scores.Length - scores.Length % Wide.Lanes;
        for (var i = 0; i < whole; i += Wide.Lanes)
        {
            i = ReadWithin(function, scores, values, i, whole);
            if (i < whole)
                At(function, Vector512.Create(scores.Slice(i, Wide.Lanes))).CopyTo(values[i..]);
        }
        if (whole == scores.Length)
            return;
        Span<double> rest = stackalloc double[Wide.Lanes];
        rest.Clear();
        scores[whole..].CopyTo(rest);
        At(function, Vector512.Create<double>(rest)).CopyTo(rest);
        rest[..(scores.Length - whole)].CopyTo(values[whole..]);
    }

    // From one place on, up to the first eight that reach beyond; returns their place.
    private static int ReadWithin<TPiecewise>(TPiecewise function, ReadOnlySpan<double> scores, Span<double> values, int from, int whole)
        where TPiecewise : struct, IPiecewise, allows ref struct
    {
        ref var source = ref MemoryMarshal.GetReference(scores);
        ref var target = ref MemoryMarshal.GetReference(values);
        for (; from < whole; from += Wide.Lanes)
        {
            var x = Vector512.LoadUnsafe(ref source, (nuint)from);
            if (ScorePieces.Beyond(x) != Vector512<double>.Zero)
                break;
            function.Within(x).StoreUnsafe(ref target, (nuint)from);
        }
        return from;
    }

    [MethodImpl(MethodImplOptions.NoInlining)]
    private static Vector512<double> At<TPiecewise>(TPiecewise function, Vector512<double> scores)
        where TPiecewise : struct, IPiecewise, allows ref struct
    {
        var beyond = ScorePieces.Beyond(scores);
        return beyond == Vector512<double>.Zero ? function.Within(scores) : function.Everywhere(scores, beyond);
    }
}
