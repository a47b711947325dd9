namespace InterfaceFE.Sparse;

/// <summary>Array of doubles at a fixed address that starts on a cache line (64 bytes). Lives as long as this object; the collector frees it.</summary>
internal sealed unsafe class AlignedBuffer
{
    private const int LineBytes = 64;

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
    }

    /// <summary>First number.</summary>
    public double* Start { get; }

    /// <summary>How many.</summary>
    public long Length { get; }

    private static int Padding => LineBytes / sizeof(double);
}
