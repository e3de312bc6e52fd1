using Portfolio.Model.Documents;
using Portfolio.Server.Contracts.Json;

namespace Portfolio.Server.Contracts.Document;

/// <summary>Which days are worked: the weekdays, less the non-working dates, plus the extra working dates.</summary>
public sealed record CalendarJson
{
    public string? Id { get; init; }

    /// <summary>mon, tue, wed, thu, fri, sat, sun.</summary>
    public IReadOnlyList<string>? WorkingWeekdays { get; init; }

    public IReadOnlyList<string>? NonWorkingDates { get; init; }

    public IReadOnlyList<string>? ExtraWorkingDates { get; init; }

    internal WorkCalendar ToModel(Reading reading, string path)
    {
        var place = new Place(path, Id is null ? "settings" : $"calendar/{Id}");
        var before = reading.Faults.Count;
        if (WorkingWeekdays is null)
            reading.Missing(place, "workingWeekdays");
        var weekdays = reading.WordList(place, "workingWeekdays", WorkingWeekdays, Words.Weekdays);
        // A calendar whose weekdays could not be read is not also one without a working day.
        if (reading.Faults.Count > before)
            weekdays = WorkCalendar.EveryDay.WorkingWeekdays;
        return new WorkCalendar(
            reading.Required(place, "id", Id), weekdays,
            reading.Dates(place, "nonWorkingDates", NonWorkingDates), reading.Dates(place, "extraWorkingDates", ExtraWorkingDates));
    }
}
