using System.Net.Mime;
using System.Text;
using Ical.Net.CalendarComponents;
using Ical.Net.DataTypes;
using Ical.Net.Serialization;

namespace Portfolio.Server.Feeds;

/// <summary>Entries as an RFC 5545 calendar: whole days that leave the reader free.</summary>
internal static class CalendarText
{
    public const string MediaType = "text/calendar";

    private const string Product = "-//Portfolio//Portfolio 1//EN";

    public static readonly string ContentType = new ContentType(MediaType) { CharSet = Encoding.UTF8.WebName }.ToString();

    /// <param name="sequence">Rises with every change of the figures.</param>
    /// <param name="stamp">When the run ended.</param>
    public static byte[] Of(IEnumerable<CalendarEntry> entries, string name, int sequence, DateTimeOffset stamp)
    {
        var calendar = new Ical.Net.Calendar { ProductId = Product, Method = "PUBLISH" };
        calendar.AddProperty("X-WR-CALNAME", name);
        calendar.Events.AddRange(entries.Select(entry => Event(entry, sequence, new CalDateTime(stamp.UtcDateTime))));
        return Encoding.UTF8.GetBytes(new CalendarSerializer().SerializeToString(calendar)!);
    }

    private static CalendarEvent Event(CalendarEntry entry, int sequence, CalDateTime stamp) => new()
    {
        Uid = entry.Uid,
        DtStamp = stamp,
        LastModified = stamp,
        Sequence = sequence,
        Start = new CalDateTime(entry.Date),
        End = new CalDateTime(entry.Date.AddDays(1)),
        Summary = entry.Summary,
        Description = entry.Description,
        Categories = [entry.Category],
        Transparency = "TRANSPARENT",
    };
}
