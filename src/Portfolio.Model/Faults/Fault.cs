namespace Portfolio.Model.Faults;

/// <summary>One thing wrong with what was sent.</summary>
/// <param name="Path">RFC 6901 pointer into the JSON that was sent, or "" when the fault lies in what is stored.</param>
/// <param name="Subject">The thing at fault: <c>weir-lock/A10</c>, <c>driver/ground</c>, <c>settings</c>.</param>
/// <param name="Code">Stable code, one of <see cref="FaultCodes"/> or <see cref="RuleCodes"/>.</param>
/// <param name="Message">A sentence that a planner understands.</param>
public sealed record Fault(string Path, string Subject, string Code, string Message);
