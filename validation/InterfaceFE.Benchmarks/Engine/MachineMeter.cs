using System.Numerics;
using System.Runtime.InteropServices;
using InterfaceFE.Benchmarks.Timing;

namespace InterfaceFE.Benchmarks.Engine;

/// <summary>Measures what the processor can do at best.</summary>
public static class MachineMeter
{
    // 4 MB, and 128 MB: within and beyond the caches of a desktop or a server's share of them.
    private const int CacheCount = 1 << 19, MemoryCount = 1 << 24;

    private const int Batches = 7;

    /// <summary>Arithmetic and memory rates of this process.</summary>
    public static MachineRates Measure() => new(EngineUnderTest.KernelWidth, EngineUnderTest.PeakFlopsPerMillisecond(), ReadingRate(CacheCount), ReadingRate(MemoryCount));

    private static double ReadingRate(int count)
    {
        var numbers = new double[count];
        numbers.AsSpan().Fill(1);
        double best = 0, total = 0;
        for (int batch = 0; batch < Batches; batch++)
        {
            double start = ThreadClock.Milliseconds();
            for (int pass = 0; pass < MemoryCount / count; pass++)
                total += Sum(numbers);
            double time = ThreadClock.Milliseconds() - start;
            if (time > 0 && total > 0)
                best = Math.Max(best, sizeof(double) * (double)MemoryCount / time);
        }
        return best;
    }

    private static double Sum(ReadOnlySpan<double> numbers)
    {
        ReadOnlySpan<Vector<double>> vectors = MemoryMarshal.Cast<double, Vector<double>>(numbers);
        Vector<double> a = default, b = default, c = default, d = default;
        for (int i = 0; i + 3 < vectors.Length; i += 4)
        {
            a += vectors[i];
            b += vectors[i + 1];
            c += vectors[i + 2];
            d += vectors[i + 3];
        }
        return Vector.Sum(a + b + c + d);
    }
}
