namespace Portfolio.Store.Results;

/// <summary>The finished result of one scope.</summary>
/// <param name="Scope">Written form: <c>portfolio</c>, <c>programme/p</c>, <c>project/p</c>, <c>milestone/p/a</c>.</param>
/// <param name="Json">Opaque to the store.</param>
public sealed record ResultRow(string Scope, byte[] Json);

/// <summary>
/// The kept distribution of one metric of one scope, with the few figures that lists need. The bytes are opaque to the store.
/// </summary>
/// <param name="Metric"><c>finish</c> or <c>cost</c>.</param>
/// <param name="Base">Base value: minutes, or minor units.</param>
/// <param name="Mean">The same unit.</param>
/// <param name="Sd">The same unit.</param>
/// <param name="Happens">The share of iterations in which it happens, 0…1.</param>
public sealed record GridRow(string Scope, string Metric, double? Base, double? Mean, double? Sd, double Happens, byte[] Bytes);

/// <summary>How a total at a level is shared out; the bytes are opaque to the store.</summary>
public sealed record AllocationRow(double Level, byte[] Bytes);

/// <summary>One point of a series.</summary>
public sealed record SeriesPoint(DateOnly AsOf, string Run, long Revision, GridRow Grid);
