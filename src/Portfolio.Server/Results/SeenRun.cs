using Portfolio.Store.Access;
using Portfolio.Store.Runs;

namespace Portfolio.Server.Results;

/// <summary>A run as one caller may see it.</summary>
internal sealed record SeenRun(Caller Caller, StoredRun Run)
{
    public string Portfolio => Run.Portfolio;

    public string Id => Run.Id;
}
