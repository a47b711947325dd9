using System.Runtime.Intrinsics.X86;

namespace InterfaceFE.Sparse;

/// <summary>
/// Inner loops of the factorisation and the solves, for column-major blocks. Row counts and leading dimensions marked "padded" are multiples of 8 and their columns start on
/// a cache line. One of three forms is taken, by what the processor offers; they agree to round-off, and each gives the same bytes every time.
/// </summary>
public static unsafe class DenseKernels
{
    private static readonly bool Wide = Avx512F.IsSupported && Avx512DQ.IsSupported;
    private static readonly bool Middle = Avx2.IsSupported && Fma.IsSupported;

    /// <summary>Width of the vectors in use, in bits: 512, 256, or 64 for the portable form.</summary>
    public static int WidthBits => Wide ? 512 : Middle ? 256 : 64;

    /// <summary>The first columns, at most 8, of c (rows×8) -= a (rows×depth) · packed (depth×8, row after row). Rows padded; the other columns of c are read, not written.</summary>
    internal static void SubtractProduct(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, nint rows, int columns)
    {
        if (Wide)
            DenseKernels512.SubtractProduct(a, aStride, packed, depth, c, cStride, rows, columns);
        else if (Middle)
            DenseKernels256.SubtractProduct(a, aStride, packed, depth, c, cStride, rows, columns);
        else
            PortableKernels.SubtractProduct(a, aStride, packed, depth, c, cStride, rows, columns);
    }

    /// <summary>packed[8k + j] = source[k·stride + j] · factor[k] for j below 8.</summary>
    internal static void Pack(double* source, nint stride, double* factor, nint depth, double* packed)
    {
        if (Wide)
            DenseKernels512.Pack(source, stride, factor, depth, packed);
        else if (Middle)
            DenseKernels256.Pack(source, stride, factor, depth, packed);
        else
            PortableKernels.Pack(source, stride, factor, depth, packed);
    }

    /// <summary>
    /// x (rows×columns, at most 8 columns) becomes x · T⁻¹ · diag(inverse), with T[j, k] = triangle[j·triangleStride + k] for k above j and a unit diagonal. Rows padded.
    /// </summary>
    internal static void SolveTriangle(double* x, nint xStride, nint rows, double* triangle, nint triangleStride, double* inverse, int columns)
    {
        if (Wide)
            DenseKernels512.SolveTriangle(x, xStride, rows, triangle, triangleStride, inverse, columns);
        else if (Middle)
            DenseKernels256.SolveTriangle(x, xStride, rows, triangle, triangleStride, inverse, columns);
        else
            PortableKernels.SolveTriangle(x, xStride, rows, triangle, triangleStride, inverse, columns);
    }

    /// <summary>target += source, any count, any alignment.</summary>
    internal static void Add(double* target, double* source, nint count)
    {
        if (Wide)
            DenseKernels512.Add(target, source, count);
        else if (Middle)
            DenseKernels256.Add(target, source, count);
        else
            PortableKernels.Add(target, source, count);
    }

    /// <summary>y -= a (rows×columns) · x. Rows padded.</summary>
    internal static void SubtractColumns(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        if (Wide)
            DenseKernels512.SubtractColumns(y, a, stride, x, columns, rows);
        else if (Middle)
            DenseKernels256.SubtractColumns(y, a, stride, x, columns, rows);
        else
            PortableKernels.SubtractColumns(y, a, stride, x, columns, rows);
    }

    /// <summary>x[k] -= a[:, k] · y for each column. Rows padded.</summary>
    internal static void SubtractDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        if (Wide)
            DenseKernels512.SubtractDots(x, a, stride, y, columns, rows);
        else if (Middle)
            DenseKernels256.SubtractDots(x, a, stride, y, columns, rows);
        else
            PortableKernels.SubtractDots(x, a, stride, y, columns, rows);
    }

    /// <summary>y += Σ over columns of |a[:, k] · b[:, k]| · weight[k]. Rows padded; a and b may be the same.</summary>
    internal static void AddAbsoluteProducts(double* y, double* a, double* b, nint stride, double* weight, int columns, nint rows)
    {
        if (Wide)
            DenseKernels512.AddAbsoluteProducts(y, a, b, stride, weight, columns, rows);
        else if (Middle)
            DenseKernels256.AddAbsoluteProducts(y, a, b, stride, weight, columns, rows);
        else
            PortableKernels.AddAbsoluteProducts(y, a, b, stride, weight, columns, rows);
    }

    /// <summary>y (rows×8, row after row) -= a (rows×columns) · x (columns×8, row after row). Any number of rows.</summary>
    internal static void SubtractLanes(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        if (Wide)
            DenseKernels512.SubtractLanes(y, a, stride, x, columns, rows);
        else if (Middle)
            DenseKernels256.SubtractLanes(y, a, stride, x, columns, rows);
        else
            PortableKernels.SubtractLanes(y, a, stride, x, columns, rows);
    }

    /// <summary>x (columns×8) -= aᵀ · y (rows×8), both row after row. Any number of rows.</summary>
    internal static void SubtractLaneDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        if (Wide)
            DenseKernels512.SubtractLaneDots(x, a, stride, y, columns, rows);
        else if (Middle)
            DenseKernels256.SubtractLaneDots(x, a, stride, y, columns, rows);
        else
            PortableKernels.SubtractLaneDots(x, a, stride, y, columns, rows);
    }
}
