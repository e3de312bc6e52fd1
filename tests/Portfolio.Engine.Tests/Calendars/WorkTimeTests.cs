using Portfolio.Engine.Calendars;
using Portfolio.Model.Documents;
using Xunit;

namespace Portfolio.Engine.Tests.Calendars;

/// <summary>Arithmetic of working time: examples by hand, and laws on random calendars.</summary>
public sealed class WorkTimeTests
{
    private const int Day = WorkTime.MinutesPerDay;
    private static readonly DateOnly Monday = new(2027, 1, 4);
    private static readonly DayOfWeek[] FiveDays = [DayOfWeek.Monday, DayOfWeek.Tuesday, DayOfWeek.Wednesday, DayOfWeek.Thursday, DayOfWeek.Friday];

    [Fact]
    public void WorkEndsAtTheEndOfAWorkingDayAndBeginsAtTheBeginningOfOne()
    {
        var calendar = new WorkTime(new WorkCalendar("five", FiveDays, [Monday.AddDays(1)], [Monday.AddDays(5)]), new DateOnly(2016, 1, 1));
        var monday = WorkTime.Instant(Monday);
        Assert.Equal(monday + Day, calendar.Add(monday, Day));
        Assert.Equal(monday + 3 * Day, calendar.Add(monday, 2 * Day)); // Tuesday is free
        Assert.Equal(monday + 2 * Day, calendar.Begin(monday + Day));
        Assert.Equal(monday + 6 * Day, calendar.Add(monday, 5 * Day)); // Saturday is worked
        Assert.Equal(monday + 7 * Day + 1, calendar.Add(monday, 5 * Day + 1));
        Assert.Equal(monday + 2 * Day, calendar.Back(monday + 6 * Day, 4 * Day));
        Assert.Equal(monday + 7 * Day, calendar.Back(monday + 8 * Day, Day));
        Assert.Equal(monday + Day, calendar.Shift(monday + 3 * Day, -Day));
        Assert.Equal(monday + 6 * Day + 77, calendar.Shift(monday + 6 * Day + 77, 0)); // no lag leaves even a Sunday
    }

    [Fact]
    public void WorkingTimeAndInstantsAreInverse() => ForRandomCalendars((calendar, t, _) =>
    {
        var worked = calendar.Worked(t);
        var at = calendar.At(worked);
        Assert.Equal(worked, calendar.Worked(at));
        Assert.True(at <= t && calendar.Worked(at - 1) < worked); // the earliest
    });

    [Fact]
    public void WorkBeginsAtTheFirstWorkingInstant() => ForRandomCalendars((calendar, t, _) =>
    {
        var begin = calendar.Begin(t);
        Assert.Equal(calendar.Worked(t), calendar.Worked(begin));
        Assert.Equal(calendar.Worked(t) + 1, calendar.Worked(begin + 1));
        Assert.Equal(begin, calendar.Begin(begin));
    });

    [Fact]
    public void FromTheEndOfWorkOneComesBackToTheLatestStart() => ForRandomCalendars((calendar, t, minutes) =>
    {
        var end = calendar.Add(t, minutes);
        Assert.Equal(calendar.Worked(t) + minutes, calendar.Worked(end));
        Assert.Equal(calendar.Begin(t), calendar.Back(end, minutes));
        Assert.Equal(end, calendar.Add(calendar.Back(end, minutes), minutes));
    });

    [Fact]
    public void ALagAndTheSameLeadCancel() => ForRandomCalendars((calendar, t, minutes) =>
    {
        Assert.Equal(calendar.Worked(t), calendar.Worked(calendar.Shift(calendar.Shift(t, minutes), -minutes)));
        Assert.Equal(calendar.Worked(t), calendar.Worked(calendar.Shift(calendar.Shift(t, -minutes), minutes)));
        Assert.Equal(calendar.Add(t, minutes), calendar.Shift(t, minutes));
    });

    [Fact]
    public void LaterStaysLater() => ForRandomCalendars((calendar, t, minutes) =>
    {
        var later = t + minutes % 4000;
        Assert.True(calendar.Begin(later) >= calendar.Begin(t));
        Assert.True(calendar.Add(later, minutes) >= calendar.Add(t, minutes));
        Assert.True(calendar.Back(later, minutes) >= calendar.Back(t, minutes));
        Assert.True(calendar.Shift(later, -minutes) >= calendar.Shift(t, -minutes));
    });

    [Fact]
    public void WorkingTimeCountsWorkedDays()
    {
        for (var seed = 0; seed < 20; seed++)
        {
            var stated = Stated(new Random(seed));
            var calendar = new WorkTime(stated, Monday.AddDays(-30));
            for (var (day, worked) = (Monday.AddDays(-30), 0); day < Monday.AddDays(400); day = day.AddDays(1))
            {
                Assert.Equal(worked, calendar.Worked(WorkTime.Instant(day)));
                var ordinary = stated.WorkingWeekdays.Contains(day.DayOfWeek) && !stated.NonWorkingDates.Contains(day);
                worked += ordinary || stated.ExtraWorkingDates.Contains(day) ? Day : 0;
            }
        }
    }

    [Fact]
    public void WhatLiesBeyondTheLastDateIsClamped()
    {
        var calendar = new WorkTime(WorkCalendar.EveryDay, Monday);
        Assert.Equal(WorkTime.HorizonMinutes, calendar.Add(WorkTime.HorizonMinutes - 10, 20));
        Assert.Equal(WorkTime.HorizonMinutes, calendar.Begin(WorkTime.HorizonMinutes + 10));
    }

    private static void ForRandomCalendars(Action<WorkTime, int, int> law)
    {
        for (var seed = 0; seed < 20; seed++)
        {
            var random = new Random(seed);
            var calendar = new WorkTime(Stated(random), Monday.AddDays(-3000));
            for (var i = 0; i < 500; i++)
            {
                // On a midnight as often as within a day, where the rules for ends and beginnings differ.
                var t = WorkTime.Instant(Monday.AddDays(random.Next(0, 500))) + (i % 2 == 0 ? 0 : random.Next(0, Day));
                law(calendar, t, i % 3 == 0 ? Day * random.Next(1, 200) : random.Next(1, 200 * Day));
            }
        }
    }

    private static WorkCalendar Stated(Random random)
    {
        var weekdays = Enum.GetValues<DayOfWeek>().Where(_ => random.Next(2) == 0).DefaultIfEmpty(DayOfWeek.Monday).ToArray();
        DateOnly[] Dates(int count) => [.. Enumerable.Range(0, count).Select(_ => Monday.AddDays(random.Next(0, 600))).Distinct()];
        return new WorkCalendar("random", weekdays, Dates(60), Dates(20));
    }
}
