namespace Portfolio.Store;

/// <summary>The folder belongs to another process that is running.</summary>
public sealed class StoreInUseException(string directory, Exception? inner = null)
    : IOException($"The storage folder '{directory}' is in use by another process. One process at a time may open it.", inner);

/// <summary>What is stored was not written by this version of the program, or its migrations were changed afterwards.</summary>
public sealed class StoreSchemaException(string message) : InvalidOperationException(message);

/// <summary>
/// The storage cannot be used just now: its disk is full, broken, read-only or busy, its server away. Nothing of a write was kept, unless
/// the way to the server broke in the moment of the commit: then nobody knows, and whoever asks again finds out.
/// </summary>
public sealed class StoreUnavailableException(Exception inner)
    : IOException($"The storage cannot be used: {inner.Message}", inner)
{
    /// <summary>True when the write may have been kept after all.</summary>
    public bool IsInDoubt { get; init; }
}

/// <summary>Stored bytes are not the ones that were written.</summary>
public sealed class StoreDamagedException(string message) : IOException(message);
