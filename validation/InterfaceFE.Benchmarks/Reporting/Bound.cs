using InterfaceFE.Benchmarks.Engine;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>
/// What bounds a measured time, by a plain model: the arithmetic at the innermost loop's best rate, the bytes at the best rate of the memory or, where they fit, of the cache,
/// and the rest, which is assembly, index lists and loops too short to reach either rate.
/// </summary>
/// <param name="Arithmetic">Share of the time that the arithmetic needs at best; the share of peak.</param>
/// <param name="Memory">Share that moving the bytes needs at best.</param>
public readonly record struct Bound(double Arithmetic, double Memory)
{
    // What the larger caches of current processors hold for one thread.
    private const double CacheBytes = 8e6;

    /// <summary>The rest's share; 0 where the first two overlap.</summary>
    public double Rest => Math.Max(0, 1 - Arithmetic - Memory);

    /// <summary>The largest of the three, in words.</summary>
    public string Name => Rest >= Arithmetic && Rest >= Memory ? "assembly, short loops" : Memory >= Arithmetic ? "memory" : "arithmetic";

    /// <summary>Judges a time.</summary>
    /// <param name="milliseconds">Measured time [ms].</param>
    /// <param name="flops">Arithmetic [flop].</param>
    /// <param name="bytes">Bytes moved.</param>
    /// <param name="rates">Best rates.</param>
    public static Bound Of(double milliseconds, double flops, double bytes, MachineRates rates)
    {
        ArgumentNullException.ThrowIfNull(rates);
        return new Bound(flops / rates.PeakFlopsPerMs / milliseconds, bytes / (bytes <= CacheBytes ? rates.CacheBytesPerMs : rates.MemoryBytesPerMs) / milliseconds);
    }
}
