using Portfolio.Model.Faults;

namespace Portfolio.Model.Rules;

/// <summary>Where a fault lies: a pointer into what was sent (null: it lies in what is stored) and the thing it is about.</summary>
internal readonly record struct Place(string? Path, string Subject)
{
    public Place Under(string member) => this with { Path = Path is null ? null : Path + "/" + member };

    public Place Under(string list, int index) => this with { Path = Path is null ? null : $"{Path}/{list}/{index}" };

    /// <summary>Under a member whose name the caller chose, escaped as RFC 6901 section 3 says.</summary>
    public Place UnderKey(string key) => Under(key.Replace("~", "~0").Replace("/", "~1"));

    public Place About(string subject) => this with { Subject = subject };

    /// <summary>About one of a list: its id after the prefix, or its place where the id is missing.</summary>
    public Place About(string prefix, string? id, int index) => About(prefix + (string.IsNullOrEmpty(id) ? index : id));

    public Fault Fault(string code, string message) => new(Path ?? "", Subject, code, message);
}
