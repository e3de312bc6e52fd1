using System.Globalization;
using Portfolio.Model.Faults;

namespace Portfolio.Server.Contracts.Json;

/// <summary>
/// Turns the texts and numbers of one request into the model's values and collects what could not be read. What could not be read becomes
/// a value that the rules pass over (NaN, <see cref="DateOnly.MinValue"/>, null), so that one mistake gives one fault.
/// </summary>
public sealed class Reading
{
    public List<Fault> Faults { get; } = [];

    public void Refuse(Place owner, string member, string code, string message) =>
        Faults.Add(new Fault(owner.Member(member), owner.Subject, code, message));

    public void Missing(Place owner, string member) =>
        Faults.Add(new Fault(owner.Path, owner.Subject, FaultCodes.MemberMissing, $"'{member}' is missing."));

    public void Reserved(Place owner, string member, bool sent)
    {
        if (sent)
            Refuse(owner, member, FaultCodes.Reserved, $"'{member}' is reserved and not served yet; leave it out.");
    }

    /// <summary>
    /// A text that must say something: an empty one counts as missing, and the null of a missing one is the sign for "reported".
    /// </summary>
    public string Required(Place owner, string member, string? text)
    {
        if (string.IsNullOrEmpty(text))
            Missing(owner, member);
        return text!;
    }

    public DateOnly? Date(Place owner, string member, string? text)
    {
        if (text is null)
            return null;
        // The model's sign for an unreadable date is itself unreadable here.
        if (DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date)
            && date != DateOnly.MinValue)
            return date;
        Refuse(owner, member, FaultCodes.DateFormat, $"'{member}' is not a date of the form 2027-03-31.");
        return DateOnly.MinValue;
    }

    public DateOnly RequiredDate(Place owner, string member, string? text)
    {
        if (text is null)
            Missing(owner, member);
        return Date(owner, member, text) ?? DateOnly.MinValue;
    }

    public double? Number(Place owner, string member, double? value)
    {
        if (value is not { } number || double.IsFinite(number))
            return value;
        Refuse(owner, member, FaultCodes.NumberNotFinite, $"'{member}' is too large to be a number here.");
        return double.NaN;
    }

    public double RequiredNumber(Place owner, string member, double? value)
    {
        if (value is null)
            Missing(owner, member);
        return Number(owner, member, value) ?? double.NaN;
    }

    /// <summary>
    /// A whole number, brought into <paramref name="least"/>…<paramref name="most"/>, where the rules still see that it is out of range.
    /// </summary>
    public long? Whole(Place owner, string member, double? value, long least = int.MinValue, long most = int.MaxValue)
    {
        if (Number(owner, member, value) is not { } number || double.IsNaN(number))
            return null;
        if (number == Math.Truncate(number))
            return (long)Math.Clamp(number, least, most);
        Refuse(owner, member, FaultCodes.NumberNotWhole, $"'{member}' must be a whole number.");
        return null;
    }

    public decimal? Money(Place owner, string member, decimal? value)
    {
        if (value != AmountConverter.TooLarge)
            return value;
        Refuse(owner, member, FaultCodes.NumberNotFinite, $"'{member}' is too large to be an amount of money.");
        return null;
    }

    public T? Word<T>(Place owner, string member, string? text, Words<T> words, string code = FaultCodes.ValueUnknown)
        where T : struct, Enum
    {
        if (text is null)
            return null;
        var meaning = words.Meaning(text);
        if (meaning is null)
            Refuse(owner, member, code, $"'{member}' must be one of {string.Join(", ", words.All)}.");
        return meaning;
    }
}
