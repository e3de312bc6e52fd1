namespace Portfolio.Server.Problems;

/// <summary>One kind of problem that the server answers with, as its page explains it.</summary>
/// <param name="Slug">Last part of the type; stable.</param>
/// <param name="Status">The HTTP status; 0 when it differs.</param>
/// <param name="Meaning">What has happened.</param>
/// <param name="Remedy">What whoever asked can do.</param>
internal sealed record ProblemKind(string Slug, int Status, string Meaning, string Remedy);
