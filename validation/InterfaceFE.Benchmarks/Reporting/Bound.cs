using InterfaceFE.Benchmarks.Engine;

namespace InterfaceFE.Benchmarks.Reporting;

/// <summary>
/// What bounds a measured time, by a plain model: the arithmetic at the innermost loop's best rate, the bytes at the memory's best rate, and the rest, which is assembly,
/// index lists and loops too short to reach either rate. Where the numbers stay in cache the bytes cost less than the model says.
/// </summary>
/// <param name="Arithmetic">Share of the time that the arithmetic needs at best; the share of peak.</param>
/// <param name="Memory">Share that moving the bytes needs at best.</param>
public readonly record struct Bound(double Arithmetic, double Memory)
{
    /// <summary>The rest's share; 0 where the first two overlap.</summary>
    public double Rest => Math.Max(0, 1 - Arithmetic - Memory);

    /// <summary>The largest of the three, in words.</summary>
    public string Name => Rest >= Arithmetic && Rest >= Memory ? "assembly and short loops" : Memory >= Arithmetic ? "memory" : "arithmetic";

    /// <summary>Judges a time.</summary>
    /// <param name="milliseconds">Measured time [ms].</param>
    /// <param name="flops">Arithmetic [flop].</param>
    /// <param name="bytes">Bytes moved.</param>
    /// <param name="rates">Best rates.</param>
    public static Bound Of(double milliseconds, double flops, double bytes, MachineRates rates)
    {
        ArgumentNullException.ThrowIfNull(rates);
        return new Bound(flops / rates.PeakFlopsPerMs / milliseconds, bytes / rates.BytesPerMs / milliseconds);
    }
}
