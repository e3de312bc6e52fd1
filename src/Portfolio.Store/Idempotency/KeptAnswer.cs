namespace Portfolio.Store.Idempotency;

/// <summary>Which write is meant.</summary>
/// <param name="Caller">Id of the caller's key: the same text from another caller is another write.</param>
/// <param name="Address">SHA-256 of method and address with its query, lower-case hex.</param>
/// <param name="Key">What the caller named it, 1 to 255 characters.</param>
public sealed record WriteKey(string Caller, string Address, string Key);

/// <summary>The answer to an accepted write.</summary>
/// <param name="Request">SHA-256 of what was sent, lower-case hex: another one under the same key is another request.</param>
/// <param name="Status">200 to 299.</param>
/// <param name="Headers">One line each, as in HTTP.</param>
public sealed record KeptAnswer(string Request, int Status, string Headers, byte[] Body);

/// <summary>Somebody else has answered the same write meanwhile; the transaction that finds it out keeps nothing.</summary>
public sealed class AnsweredAlreadyException() : InvalidOperationException("The write was answered already.");
