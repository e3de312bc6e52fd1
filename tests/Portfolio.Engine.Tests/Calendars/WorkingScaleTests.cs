using Portfolio.Engine.Calendars;
using Portfolio.Engine.Networks;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Calendars;

/// <summary>The scale of working time says the same as minutes, for every operation and as rows.</summary>
public sealed class WorkingScaleTests
{
    private static readonly DateOnly Start = new(2026, 11, 30);

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    public void EveryOperationAgreesWithMinutes(int seed)
    {
        var random = new Random(seed);
        for (var round = 0; round < 50; round++)
        {
            var minutes = new WorkTime(Stated(random), Start.AddDays(-400));
            var working = minutes.InWorkingTime();
            Assert.NotNull(working);
            for (var i = 0; i < 40; i++)
            {
                var date = Start.AddDays(random.Next(-300, 300));
                var (t, w) = (minutes.BeginningOf(date), working.BeginningOf(date));
                Assert.Equal(t, working.ToMinutes(w));
                var work = random.Next(0, 40 * WorkTime.MinutesPerDay);
                if (i % 3 == 0)
                    work -= work % WorkTime.MinutesPerDay;
                var lag = random.Next(-30, 30) * 720;
                Agree(minutes.Begin(t), working.Begin(w));
                Agree(minutes.Add(t, work), working.Add(w, work));
                Agree(minutes.Back(t, work), working.Back(w, work));
                Agree(minutes.Shift(t, lag), working.Shift(w, lag));
                Agree(minutes.Add(minutes.Begin(minutes.Shift(t, lag)), work), working.Add(working.Begin(working.Shift(w, lag)), work));
                Assert.Equal(minutes.Worked(t), working.Worked(w));

                void Agree(int expected, int actual) => Assert.Equal(expected, working.ToMinutes(actual));
            }
        }
    }

    [Fact]
    public void RowsAgreeWithSingleInstants()
    {
        var random = new Random(5);
        foreach (var scale in new[] { false, true })
        {
            var minutes = new WorkTime(Stated(random), Start.AddDays(-400));
            var calendar = scale ? minutes.InWorkingTime()! : minutes;
            int[] from = [.. Enumerable.Range(0, 37).Select(_ => calendar.BeginningOf(Start.AddDays(random.Next(0, 300))))];
            int[] work = [.. from.Select(_ => random.Next(0, 3) * random.Next(0, 100_000))];
            var rows = new int[from.Length];
            InstantRows.Add(calendar, from, work, rows);
            Assert.Equal(from.Select((t, k) => calendar.Add(t, work[k])), rows);
            InstantRows.Shift(calendar, from, -4000, rows);
            Assert.Equal(from.Select(t => calendar.Shift(t, -4000)), rows);
            InstantRows.Back(calendar, from, work, rows);
            Assert.Equal(from.Select((t, k) => calendar.Worked(calendar.Back(t, work[k]))), rows.Select(calendar.Worked));
        }
    }

    [Fact]
    public void WorkBeyondTheLastDateIsClamped()
    {
        var calendar = new WorkTime(WorkCalendar.EveryDay, Start).InWorkingTime()!;
        Assert.Equal(calendar.Horizon, calendar.Add(calendar.BeginningOf(Start), 1 << 29));
        int[] row = [.. Enumerable.Repeat(calendar.BeginningOf(Start), 16)];
        InstantRows.Add(calendar, row, [.. row.Select(_ => 1 << 29)], row);
        Assert.All(row, end => Assert.Equal(WorkTime.HorizonMinutes, calendar.ToMinutes(end)));
    }

    private static WorkCalendar Stated(Random random)
    {
        DayOfWeek[] weekdays = [.. Enum.GetValues<DayOfWeek>().Where(_ => random.Next(3) > 0).DefaultIfEmpty(DayOfWeek.Monday)];
        DateOnly[] off = [.. Enumerable.Range(0, 40).Select(_ => Start.AddDays(random.Next(-300, 400)))];
        DateOnly[] extra = [.. Enumerable.Range(0, 10).Select(_ => Start.AddDays(random.Next(-300, 400)))];
        return new WorkCalendar("c", weekdays, off, extra);
    }
}
