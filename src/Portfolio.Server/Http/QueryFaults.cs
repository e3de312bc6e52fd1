using System.Globalization;
using Portfolio.Model.Faults;
using Portfolio.Server.Problems;

namespace Portfolio.Server.Http;

/// <summary>Reads parameters of the query and collects what is wrong with them, so that one answer (422) names all.</summary>
internal sealed class QueryFaults
{
    private static readonly DateOnly Earliest = new(1970, 1, 1);
    private static readonly DateOnly Latest = new(2199, 12, 31);

    private readonly List<Fault> faults = [];

    public void Add(string parameter, string message) => faults.Add(new("", parameter, FaultCodes.ParameterInvalid, message));

    /// <summary>The refusal of one parameter.</summary>
    public static RequestRefused Of(string parameter, string message)
    {
        var faults = new QueryFaults();
        faults.Add(parameter, message);
        return faults.ToException();
    }

    public DateOnly? Date(string parameter, string? text)
    {
        if (text is null) return null;
        if (DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date)
            && date >= Earliest && date <= Latest)
            return date;
        Add(parameter, $"'{parameter}' must be a date such as 2027-03-31, from {Earliest.Year} to {Latest.Year}.");
        return null;
    }

    public string Word(string parameter, string? text, string usual, IReadOnlyList<string> words)
    {
        if (text is not null && !words.Contains(text, StringComparer.Ordinal))
            Add(parameter, $"'{parameter}' must be one of {string.Join(", ", words)}.");
        return text ?? usual;
    }

    public int Whole(string parameter, string? text, int usual, int least, int most)
    {
        if (text is null) return usual;
        if (int.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out var number) && number >= least && number <= most)
            return number;
        Add(parameter, $"'{parameter}' must be a whole number from {least} to {most}.");
        return usual;
    }

    /// <exception cref="RequestRefused">Something was wrong.</exception>
    public void Refuse()
    {
        if (faults.Count > 0) throw ToException();
    }

    public RequestRefused ToException() => new(Problem.Refused(faults));
}
