using System.Runtime.InteropServices;

namespace InterfaceFE.Sparse;

/// <summary>
/// Array of doubles at a fixed address that starts on a cache line (64 bytes). Lives as long as this object; the collector frees it. Large ones ask Linux for large pages, which
/// the system gives or not: the walk through a factor of a hundred megabytes otherwise waits for addresses (measured at 104 thousand unknowns).
/// </summary>
internal sealed unsafe class AlignedBuffer
{
    private const int LineBytes = 64;
    private const nint LargePage = 2 << 20;
    private const int AdviseLargePages = 14;

    private readonly double[] _store;

    /// <summary>Takes zeroed memory.</summary>
    /// <exception cref="ArgumentException">More numbers than one array can hold.</exception>
    public AlignedBuffer(long length)
    {
        if (length + Padding > Array.MaxLength)
            throw new ArgumentException($"The factor needs an array of {length} numbers; at most {Array.MaxLength - Padding} fit.", nameof(length));
        Length = length;
        _store = GC.AllocateArray<double>((int)length + Padding, pinned: true);
        fixed (double* start = _store)
            Start = (double*)(((nint)start + LineBytes - 1) / LineBytes * LineBytes);
        if (OperatingSystem.IsLinux())
            AskForLargePages((nint)Start, length * sizeof(double));
    }

    /// <summary>First number.</summary>
    public double* Start { get; }

    /// <summary>How many.</summary>
    public long Length { get; }

    private static int Padding => LineBytes / sizeof(double);

    private static void AskForLargePages(nint start, long bytes)
    {
        nint first = (start + LargePage - 1) / LargePage * LargePage, end = (start + (nint)bytes) / LargePage * LargePage;
        if (end <= first)
            return;
        // Advice only: neither an error nor a system library of another name is a fault.
        try
        {
            _ = Advise(first, (nuint)(end - first), AdviseLargePages);
        }
        catch (Exception e) when (e is DllNotFoundException or EntryPointNotFoundException)
        {
        }
    }

    [DllImport("libc", EntryPoint = "madvise")]
    private static extern int Advise(nint start, nuint bytes, int advice);
}
