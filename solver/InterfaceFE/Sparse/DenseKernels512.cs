using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace InterfaceFE.Sparse;

/// <summary>The kernels for AVX-512: 16×8 and 8×8 register blocks, unrolled by hand because the compiler keeps only named locals in registers. See <see cref="DenseKernels"/> for what each does.</summary>
internal static unsafe class DenseKernels512
{
    public static void SubtractProduct(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, nint rows, int columns)
    {
        nint i = 0;
        for (; i + 16 <= rows; i += 16)
            Subtract16By8(a + i, aStride, packed, depth, c + i, cStride, columns);
        if (i < rows)
            Subtract8By8(a + i, aStride, packed, depth, c + i, cStride, columns);
    }

    public static void Pack(double* source, nint stride, double* factor, nint depth, double* packed)
    {
        for (nint k = 0; k < depth; k++, source += stride, packed += 8)
            (Vector512.Load(source) * Vector512.Create(factor[k])).Store(packed);
    }

    public static void Add(double* target, double* source, nint count)
    {
        nint i = 0;
        for (; i + 8 <= count; i += 8)
            (Vector512.Load(target + i) + Vector512.Load(source + i)).Store(target + i);
        if (i + 4 <= count)
        {
            (Vector256.Load(target + i) + Vector256.Load(source + i)).Store(target + i);
            i += 4;
        }
        if (i + 2 <= count)
        {
            (Vector128.Load(target + i) + Vector128.Load(source + i)).Store(target + i);
            i += 2;
        }
        if (i < count)
            target[i] += source[i];
    }

    public static void SubtractColumns(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        int k = 0;
        for (; k + 4 <= columns; k += 4, a += 4 * stride)
        {
            Vector512<double> x0 = Vector512.Create(x[k]), x1 = Vector512.Create(x[k + 1]), x2 = Vector512.Create(x[k + 2]), x3 = Vector512.Create(x[k + 3]);
            double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
            for (nint i = 0; i < rows; i += 8)
            {
                Vector512<double> value = Avx512F.FusedMultiplyAddNegated(Vector512.Load(a + i), x0, Vector512.Load(y + i));
                value = Avx512F.FusedMultiplyAddNegated(Vector512.Load(a1 + i), x1, value);
                value = Avx512F.FusedMultiplyAddNegated(Vector512.Load(a2 + i), x2, value);
                Avx512F.FusedMultiplyAddNegated(Vector512.Load(a3 + i), x3, value).Store(y + i);
            }
        }
        for (; k < columns; k++, a += stride)
        {
            Vector512<double> factor = Vector512.Create(x[k]);
            for (nint i = 0; i < rows; i += 8)
                Avx512F.FusedMultiplyAddNegated(Vector512.Load(a + i), factor, Vector512.Load(y + i)).Store(y + i);
        }
    }

    public static void SubtractDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        int k = 0;
        for (; k + 4 <= columns; k += 4, a += 4 * stride)
        {
            Vector512<double> s0 = Vector512<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
            double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
            for (nint i = 0; i < rows; i += 8)
            {
                Vector512<double> value = Vector512.Load(y + i);
                s0 = Avx512F.FusedMultiplyAdd(Vector512.Load(a + i), value, s0);
                s1 = Avx512F.FusedMultiplyAdd(Vector512.Load(a1 + i), value, s1);
                s2 = Avx512F.FusedMultiplyAdd(Vector512.Load(a2 + i), value, s2);
                s3 = Avx512F.FusedMultiplyAdd(Vector512.Load(a3 + i), value, s3);
            }
            x[k] -= Vector512.Sum(s0);
            x[k + 1] -= Vector512.Sum(s1);
            x[k + 2] -= Vector512.Sum(s2);
            x[k + 3] -= Vector512.Sum(s3);
        }
        for (; k < columns; k++, a += stride)
        {
            Vector512<double> sum = Vector512<double>.Zero;
            for (nint i = 0; i < rows; i += 8)
                sum = Avx512F.FusedMultiplyAdd(Vector512.Load(a + i), Vector512.Load(y + i), sum);
            x[k] -= Vector512.Sum(sum);
        }
    }

    public static void AddAbsoluteProducts(double* y, double* a, double* b, nint stride, double* weight, int columns, nint rows)
    {
        for (nint i = 0; i < rows; i += 8)
        {
            Vector512<double> sum = Vector512.Load(y + i);
            for (int k = 0; k < columns; k++)
                sum = Avx512F.FusedMultiplyAdd(Vector512.Abs(Vector512.Load(a + k * stride + i) * Vector512.Load(b + k * stride + i)), Vector512.Create(weight[k]), sum);
            sum.Store(y + i);
        }
    }

    public static void SolveTriangle(double* x, nint xStride, nint rows, double* triangle, nint triangleStride, double* inverse, int columns)
    {
        for (nint i = 0; i < rows; i += 8, x += 8)
        {
            Vector512<double> x0 = Vector512.Load(x);
            (x0 * Vector512.Create(inverse[0])).Store(x);
            if (columns == 1)
                continue;
            Vector512<double> x1 = Vector512.Load(x + xStride);
            x1 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[1]), x1);
            (x1 * Vector512.Create(inverse[1])).Store(x + xStride);
            if (columns == 2)
                continue;
            Vector512<double> x2 = Vector512.Load(x + 2 * xStride);
            x2 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[2]), x2);
            x2 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 2]), x2);
            (x2 * Vector512.Create(inverse[2])).Store(x + 2 * xStride);
            if (columns == 3)
                continue;
            Vector512<double> x3 = Vector512.Load(x + 3 * xStride);
            x3 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[3]), x3);
            x3 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 3]), x3);
            x3 = Avx512F.FusedMultiplyAddNegated(x2, Vector512.Create(triangle[2 * triangleStride + 3]), x3);
            (x3 * Vector512.Create(inverse[3])).Store(x + 3 * xStride);
            if (columns == 4)
                continue;
            Vector512<double> x4 = Vector512.Load(x + 4 * xStride);
            x4 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[4]), x4);
            x4 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 4]), x4);
            x4 = Avx512F.FusedMultiplyAddNegated(x2, Vector512.Create(triangle[2 * triangleStride + 4]), x4);
            x4 = Avx512F.FusedMultiplyAddNegated(x3, Vector512.Create(triangle[3 * triangleStride + 4]), x4);
            (x4 * Vector512.Create(inverse[4])).Store(x + 4 * xStride);
            if (columns == 5)
                continue;
            Vector512<double> x5 = Vector512.Load(x + 5 * xStride);
            x5 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[5]), x5);
            x5 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 5]), x5);
            x5 = Avx512F.FusedMultiplyAddNegated(x2, Vector512.Create(triangle[2 * triangleStride + 5]), x5);
            x5 = Avx512F.FusedMultiplyAddNegated(x3, Vector512.Create(triangle[3 * triangleStride + 5]), x5);
            x5 = Avx512F.FusedMultiplyAddNegated(x4, Vector512.Create(triangle[4 * triangleStride + 5]), x5);
            (x5 * Vector512.Create(inverse[5])).Store(x + 5 * xStride);
            if (columns == 6)
                continue;
            Vector512<double> x6 = Vector512.Load(x + 6 * xStride);
            x6 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[6]), x6);
            x6 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 6]), x6);
            x6 = Avx512F.FusedMultiplyAddNegated(x2, Vector512.Create(triangle[2 * triangleStride + 6]), x6);
            x6 = Avx512F.FusedMultiplyAddNegated(x3, Vector512.Create(triangle[3 * triangleStride + 6]), x6);
            x6 = Avx512F.FusedMultiplyAddNegated(x4, Vector512.Create(triangle[4 * triangleStride + 6]), x6);
            x6 = Avx512F.FusedMultiplyAddNegated(x5, Vector512.Create(triangle[5 * triangleStride + 6]), x6);
            (x6 * Vector512.Create(inverse[6])).Store(x + 6 * xStride);
            if (columns == 7)
                continue;
            Vector512<double> x7 = Vector512.Load(x + 7 * xStride);
            x7 = Avx512F.FusedMultiplyAddNegated(x0, Vector512.Create(triangle[7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x1, Vector512.Create(triangle[triangleStride + 7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x2, Vector512.Create(triangle[2 * triangleStride + 7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x3, Vector512.Create(triangle[3 * triangleStride + 7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x4, Vector512.Create(triangle[4 * triangleStride + 7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x5, Vector512.Create(triangle[5 * triangleStride + 7]), x7);
            x7 = Avx512F.FusedMultiplyAddNegated(x6, Vector512.Create(triangle[6 * triangleStride + 7]), x7);
            (x7 * Vector512.Create(inverse[7])).Store(x + 7 * xStride);
        }
    }

    private static void Subtract16By8(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, int columns)
    {
        Vector512<double> c00 = Vector512.Load(c);
        Vector512<double> c10 = Vector512.Load(c + 8);
        Vector512<double> c01 = Vector512.Load(c + cStride);
        Vector512<double> c11 = Vector512.Load(c + cStride + 8);
        Vector512<double> c02 = Vector512.Load(c + 2 * cStride);
        Vector512<double> c12 = Vector512.Load(c + 2 * cStride + 8);
        Vector512<double> c03 = Vector512.Load(c + 3 * cStride);
        Vector512<double> c13 = Vector512.Load(c + 3 * cStride + 8);
        Vector512<double> c04 = Vector512.Load(c + 4 * cStride);
        Vector512<double> c14 = Vector512.Load(c + 4 * cStride + 8);
        Vector512<double> c05 = Vector512.Load(c + 5 * cStride);
        Vector512<double> c15 = Vector512.Load(c + 5 * cStride + 8);
        Vector512<double> c06 = Vector512.Load(c + 6 * cStride);
        Vector512<double> c16 = Vector512.Load(c + 6 * cStride + 8);
        Vector512<double> c07 = Vector512.Load(c + 7 * cStride);
        Vector512<double> c17 = Vector512.Load(c + 7 * cStride + 8);
        for (nint k = 0; k < depth; k++, a += aStride, packed += 8)
        {
            Vector512<double> a0 = Vector512.Load(a);
            Vector512<double> a1 = Vector512.Load(a + 8);
            Vector512<double> b = Vector512.Create(packed[0]);
            c00 = Avx512F.FusedMultiplyAddNegated(a0, b, c00);
            c10 = Avx512F.FusedMultiplyAddNegated(a1, b, c10);
            b = Vector512.Create(packed[1]);
            c01 = Avx512F.FusedMultiplyAddNegated(a0, b, c01);
            c11 = Avx512F.FusedMultiplyAddNegated(a1, b, c11);
            b = Vector512.Create(packed[2]);
            c02 = Avx512F.FusedMultiplyAddNegated(a0, b, c02);
            c12 = Avx512F.FusedMultiplyAddNegated(a1, b, c12);
            b = Vector512.Create(packed[3]);
            c03 = Avx512F.FusedMultiplyAddNegated(a0, b, c03);
            c13 = Avx512F.FusedMultiplyAddNegated(a1, b, c13);
            b = Vector512.Create(packed[4]);
            c04 = Avx512F.FusedMultiplyAddNegated(a0, b, c04);
            c14 = Avx512F.FusedMultiplyAddNegated(a1, b, c14);
            b = Vector512.Create(packed[5]);
            c05 = Avx512F.FusedMultiplyAddNegated(a0, b, c05);
            c15 = Avx512F.FusedMultiplyAddNegated(a1, b, c15);
            b = Vector512.Create(packed[6]);
            c06 = Avx512F.FusedMultiplyAddNegated(a0, b, c06);
            c16 = Avx512F.FusedMultiplyAddNegated(a1, b, c16);
            b = Vector512.Create(packed[7]);
            c07 = Avx512F.FusedMultiplyAddNegated(a0, b, c07);
            c17 = Avx512F.FusedMultiplyAddNegated(a1, b, c17);
        }
        c00.Store(c);
        c10.Store(c + 8);
        if (columns == 1)
            return;
        c01.Store(c + cStride);
        c11.Store(c + cStride + 8);
        if (columns == 2)
            return;
        c02.Store(c + 2 * cStride);
        c12.Store(c + 2 * cStride + 8);
        if (columns == 3)
            return;
        c03.Store(c + 3 * cStride);
        c13.Store(c + 3 * cStride + 8);
        if (columns == 4)
            return;
        c04.Store(c + 4 * cStride);
        c14.Store(c + 4 * cStride + 8);
        if (columns == 5)
            return;
        c05.Store(c + 5 * cStride);
        c15.Store(c + 5 * cStride + 8);
        if (columns == 6)
            return;
        c06.Store(c + 6 * cStride);
        c16.Store(c + 6 * cStride + 8);
        if (columns == 7)
            return;
        c07.Store(c + 7 * cStride);
        c17.Store(c + 7 * cStride + 8);
    }

    private static void Subtract8By8(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, int columns)
    {
        Vector512<double> c00 = Vector512.Load(c);
        Vector512<double> c01 = Vector512.Load(c + cStride);
        Vector512<double> c02 = Vector512.Load(c + 2 * cStride);
        Vector512<double> c03 = Vector512.Load(c + 3 * cStride);
        Vector512<double> c04 = Vector512.Load(c + 4 * cStride);
        Vector512<double> c05 = Vector512.Load(c + 5 * cStride);
        Vector512<double> c06 = Vector512.Load(c + 6 * cStride);
        Vector512<double> c07 = Vector512.Load(c + 7 * cStride);
        for (nint k = 0; k < depth; k++, a += aStride, packed += 8)
        {
            Vector512<double> a0 = Vector512.Load(a);
            Vector512<double> b = Vector512.Create(packed[0]);
            c00 = Avx512F.FusedMultiplyAddNegated(a0, b, c00);
            b = Vector512.Create(packed[1]);
            c01 = Avx512F.FusedMultiplyAddNegated(a0, b, c01);
            b = Vector512.Create(packed[2]);
            c02 = Avx512F.FusedMultiplyAddNegated(a0, b, c02);
            b = Vector512.Create(packed[3]);
            c03 = Avx512F.FusedMultiplyAddNegated(a0, b, c03);
            b = Vector512.Create(packed[4]);
            c04 = Avx512F.FusedMultiplyAddNegated(a0, b, c04);
            b = Vector512.Create(packed[5]);
            c05 = Avx512F.FusedMultiplyAddNegated(a0, b, c05);
            b = Vector512.Create(packed[6]);
            c06 = Avx512F.FusedMultiplyAddNegated(a0, b, c06);
            b = Vector512.Create(packed[7]);
            c07 = Avx512F.FusedMultiplyAddNegated(a0, b, c07);
        }
        c00.Store(c);
        if (columns == 1)
            return;
        c01.Store(c + cStride);
        if (columns == 2)
            return;
        c02.Store(c + 2 * cStride);
        if (columns == 3)
            return;
        c03.Store(c + 3 * cStride);
        if (columns == 4)
            return;
        c04.Store(c + 4 * cStride);
        if (columns == 5)
            return;
        c05.Store(c + 5 * cStride);
        if (columns == 6)
            return;
        c06.Store(c + 6 * cStride);
        if (columns == 7)
            return;
        c07.Store(c + 7 * cStride);
    }

    public static void SubtractLanes(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        for (; columns >= 4; columns -= 4, a += 4 * stride, x += 32)
            SubtractFourLanes(y, a, stride, x, rows);
        for (; columns > 0; columns--, a += stride, x += 8)
        {
            Vector512<double> x0 = Vector512.Load(x);
            for (nint i = 0; i < rows; i++)
                Avx512F.FusedMultiplyAddNegated(Vector512.Create(a[i]), x0, Vector512.Load(y + 8 * i)).Store(y + 8 * i);
        }
    }

    public static void SubtractLaneDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        for (; columns >= 4; columns -= 4, a += 4 * stride, x += 32)
            SubtractFourLaneDots(x, a, stride, y, rows);
        for (; columns > 0; columns--, a += stride, x += 8)
        {
            Vector512<double> sum0 = Vector512<double>.Zero;
            for (nint i = 0; i < rows; i++)
                sum0 = Avx512F.FusedMultiplyAdd(Vector512.Create(a[i]), Vector512.Load(y + 8 * i), sum0);
            (Vector512.Load(x) - sum0).Store(x);
        }
    }

    private static void SubtractFourLanes(double* y, double* a, nint stride, double* x, nint rows)
    {
        double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
        Vector512<double> x0 = Vector512.Load(x), x1 = Vector512.Load(x + 8), x2 = Vector512.Load(x + 16), x3 = Vector512.Load(x + 24);
        for (nint i = 0; i < rows; i++)
        {
            Vector512<double> value = Avx512F.FusedMultiplyAddNegated(Vector512.Create(a[i]), x0, Vector512.Load(y + 8 * i));
            value = Avx512F.FusedMultiplyAddNegated(Vector512.Create(a1[i]), x1, value);
            value = Avx512F.FusedMultiplyAddNegated(Vector512.Create(a2[i]), x2, value);
            Avx512F.FusedMultiplyAddNegated(Vector512.Create(a3[i]), x3, value).Store(y + 8 * i);
        }
    }

    private static void SubtractFourLaneDots(double* x, double* a, nint stride, double* y, nint rows)
    {
        double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
        Vector512<double> s0 = Vector512<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
        for (nint i = 0; i < rows; i++)
        {
            Vector512<double> value = Vector512.Load(y + 8 * i);
            s0 = Avx512F.FusedMultiplyAdd(Vector512.Create(a[i]), value, s0);
            s1 = Avx512F.FusedMultiplyAdd(Vector512.Create(a1[i]), value, s1);
            s2 = Avx512F.FusedMultiplyAdd(Vector512.Create(a2[i]), value, s2);
            s3 = Avx512F.FusedMultiplyAdd(Vector512.Create(a3[i]), value, s3);
        }
        (Vector512.Load(x) - s0).Store(x);
        (Vector512.Load(x + 8) - s1).Store(x + 8);
        (Vector512.Load(x + 16) - s2).Store(x + 16);
        (Vector512.Load(x + 24) - s3).Store(x + 24);
    }
}
