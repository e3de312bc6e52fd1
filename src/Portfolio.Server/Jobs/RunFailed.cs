namespace Portfolio.Server.Jobs;

/// <summary>A run that cannot succeed however often it is tried; the message is for those who asked for it.</summary>
internal sealed class RunFailed(string message, Exception? inner = null) : Exception(message, inner);

/// <summary>Another worker has the run, or it has ended: stop quietly, write nothing.</summary>
internal sealed class LeaseLost() : Exception("The run belongs to another worker.");
