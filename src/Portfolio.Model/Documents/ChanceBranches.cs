namespace Portfolio.Model.Documents;

/// <summary>A fork of which exactly one branch happens in an iteration.</summary>
public sealed record ChanceBranches(string Id, string? Name, IReadOnlyList<Branch> Branches);

/// <summary>One way it can go: its probability, 0–1, and the activities that happen only then.</summary>
public sealed record Branch(string Id, double Probability, IReadOnlyList<string> Activities);
