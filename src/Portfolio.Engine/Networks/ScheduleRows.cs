namespace Portfolio.Engine.Networks;

/// <summary>
/// Minutes of work, starts and finishes of activities over the iterations of a chunk, one row each as a <see cref="RowLayout"/> says.
/// Starts and finishes are instants. Belongs to one thread.
/// </summary>
internal sealed class ScheduleRows(RowLayout layout, int capacity)
{
    private readonly int[] _rows = new int[layout.Rows * capacity];

    public int Capacity => capacity;

    public Span<int> Work(int activity, int count) => _rows.AsSpan(layout.Work[activity] * capacity, count);

    public Span<int> Start(int activity, int count) => _rows.AsSpan(layout.Start[activity] * capacity, count);

    public Span<int> Finish(int activity, int count) => _rows.AsSpan(layout.Finish[activity] * capacity, count);
}
