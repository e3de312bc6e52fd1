namespace Portfolio.Engine.Networks;

/// <summary>
/// Minutes of work, starts and finishes of every activity over the iterations of a chunk: the row of activity a begins at a · capacity.
/// Starts and finishes are instants in minutes. Belongs to one thread.
/// </summary>
internal sealed class ScheduleRows(int activities, int capacity)
{
    private readonly int[] _work = new int[activities * capacity];
    private readonly int[] _start = new int[activities * capacity];
    private readonly int[] _finish = new int[activities * capacity];

    public int Capacity => capacity;

    public Span<int> Work(int activity, int count) => _work.AsSpan(activity * capacity, count);

    public Span<int> Start(int activity, int count) => _start.AsSpan(activity * capacity, count);

    public Span<int> Finish(int activity, int count) => _finish.AsSpan(activity * capacity, count);
}
