using Portfolio.Model.Documents;

namespace Portfolio.Engine.Results;

/// <summary>One result row of a run.</summary>
/// <param name="Scope">What it is about.</param>
/// <param name="Finish">Never null.</param>
/// <param name="Cost">Null for milestones.</param>
/// <param name="Joint">Null when no date or no budget was promised.</param>
public sealed record ScopeResult(Scope Scope, Grid Finish, Grid? Cost, JointConfidence? Joint);
