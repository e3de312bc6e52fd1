namespace Portfolio.Server.Http;

/// <summary>The note that may come with any write and is kept with its revision.</summary>
internal static class Notes
{
    private const int Longest = 500;

    public static string? Checked(string? note) =>
        note is null || (note.Length <= Longest && !note.Any(char.IsControl))
            ? note
            : throw QueryFaults.Of("note", $"'note' may have {Longest} characters and no control characters.");
}
