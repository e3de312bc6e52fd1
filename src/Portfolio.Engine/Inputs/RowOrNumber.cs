using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Portfolio.Engine.Inputs;

/// <summary>One value for each iteration of a chunk: a row, or one number for all where nothing varies.</summary>
internal readonly ref struct RowOrNumber
{
    private readonly ReadOnlySpan<double> _row;
    private readonly double _number;

    private RowOrNumber(ReadOnlySpan<double> row) => _row = row;

    private RowOrNumber(double number) => _number = number;

    public static implicit operator RowOrNumber(Span<double> row) => new(row);

    public static implicit operator RowOrNumber(double number) => new(number);

    public double this[int iteration] => _row.IsEmpty ? _number : _row[iteration];

    /// <summary>The values of eight iterations from <paramref name="first"/> on; the row is that long.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector512<double> Eight(int first) => _row.IsEmpty
        ? Vector512.Create(_number)
        : Vector512.LoadUnsafe(ref MemoryMarshal.GetReference(_row), (nuint)first);
}
