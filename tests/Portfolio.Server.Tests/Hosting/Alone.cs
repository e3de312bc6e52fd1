namespace Portfolio.Server.Tests.Hosting;

/// <summary>Tests that measure time or memory: nothing else runs beside them.</summary>
[CollectionDefinition(nameof(Alone), DisableParallelization = true)]
public sealed class Alone;
