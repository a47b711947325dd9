using System.Runtime.InteropServices;
using InterfaceFE.Benchmarks.Models;

namespace InterfaceFE.Benchmarks.Rivals;

/// <summary>Raw little-endian files of numbers for other programs.</summary>
public static class BinaryFiles
{
    /// <summary>Writes a matrix and a right side: counts, column starts, rows, values, right side.</summary>
    public static void WriteSystem(string file, AssembledMatrix matrix, double[] rightSide)
    {
        ArgumentNullException.ThrowIfNull(matrix);
        using FileStream stream = File.Create(file);
        Write<int>(stream, [matrix.Size, matrix.Values.Length]);
        Write<int>(stream, matrix.Start);
        Write<int>(stream, matrix.Rows);
        Write<double>(stream, matrix.Values);
        Write<double>(stream, rightSide);
    }

    /// <summary>Writes an order.</summary>
    public static void WriteOrder(string file, int[] order)
    {
        using FileStream stream = File.Create(file);
        Write<int>(stream, order);
    }

    /// <summary>Reads a vector.</summary>
    /// <exception cref="EndOfStreamException">The file is too short.</exception>
    public static double[] ReadVector(string file, int count)
    {
        var vector = new double[count];
        using FileStream stream = File.OpenRead(file);
        stream.ReadExactly(MemoryMarshal.AsBytes(vector.AsSpan()));
        return vector;
    }

    private static void Write<T>(FileStream stream, ReadOnlySpan<T> numbers)
        where T : unmanaged => stream.Write(MemoryMarshal.AsBytes(numbers));
}
