using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace InterfaceFE.Sparse;

/// <summary>The kernels for AVX2 with fused multiply-add: 8×4 register blocks, unrolled by hand because the compiler keeps only named locals in registers. See <see cref="DenseKernels"/> for what each does.</summary>
internal static unsafe class DenseKernels256
{
    public static void SubtractProduct(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, nint rows, int columns)
    {
        for (nint i = 0; i < rows; i += 8)
        {
            Subtract8By4(a + i, aStride, packed, depth, c + i, cStride, columns);
            if (columns > 4)
                Subtract8By4(a + i, aStride, packed + 4, depth, c + 4 * cStride + i, cStride, columns - 4);
        }
    }

    public static void Pack(double* source, nint stride, double* factor, nint depth, double* packed)
    {
        for (nint k = 0; k < depth; k++, source += stride, packed += 8)
        {
            Vector256<double> f = Vector256.Create(factor[k]);
            (Vector256.Load(source) * f).Store(packed);
            (Vector256.Load(source + 4) * f).Store(packed + 4);
        }
    }

    public static void Add(double* target, double* source, nint count)
    {
        nint i = 0;
        for (; i + 4 <= count; i += 4)
            (Vector256.Load(target + i) + Vector256.Load(source + i)).Store(target + i);
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
            Vector256<double> x0 = Vector256.Create(x[k]), x1 = Vector256.Create(x[k + 1]), x2 = Vector256.Create(x[k + 2]), x3 = Vector256.Create(x[k + 3]);
            double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
            for (nint i = 0; i < rows; i += 4)
            {
                Vector256<double> value = Fma.MultiplyAddNegated(Vector256.Load(a + i), x0, Vector256.Load(y + i));
                value = Fma.MultiplyAddNegated(Vector256.Load(a1 + i), x1, value);
                value = Fma.MultiplyAddNegated(Vector256.Load(a2 + i), x2, value);
                Fma.MultiplyAddNegated(Vector256.Load(a3 + i), x3, value).Store(y + i);
            }
        }
        for (; k < columns; k++, a += stride)
        {
            Vector256<double> factor = Vector256.Create(x[k]);
            for (nint i = 0; i < rows; i += 4)
                Fma.MultiplyAddNegated(Vector256.Load(a + i), factor, Vector256.Load(y + i)).Store(y + i);
        }
    }

    public static void SubtractDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        int k = 0;
        for (; k + 4 <= columns; k += 4, a += 4 * stride)
        {
            Vector256<double> s0 = Vector256<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
            double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
            for (nint i = 0; i < rows; i += 4)
            {
                Vector256<double> value = Vector256.Load(y + i);
                s0 = Fma.MultiplyAdd(Vector256.Load(a + i), value, s0);
                s1 = Fma.MultiplyAdd(Vector256.Load(a1 + i), value, s1);
                s2 = Fma.MultiplyAdd(Vector256.Load(a2 + i), value, s2);
                s3 = Fma.MultiplyAdd(Vector256.Load(a3 + i), value, s3);
            }
            x[k] -= Vector256.Sum(s0);
            x[k + 1] -= Vector256.Sum(s1);
            x[k + 2] -= Vector256.Sum(s2);
            x[k + 3] -= Vector256.Sum(s3);
        }
        for (; k < columns; k++, a += stride)
        {
            Vector256<double> sum = Vector256<double>.Zero;
            for (nint i = 0; i < rows; i += 4)
                sum = Fma.MultiplyAdd(Vector256.Load(a + i), Vector256.Load(y + i), sum);
            x[k] -= Vector256.Sum(sum);
        }
    }

    public static void AddAbsoluteProducts(double* y, double* a, double* b, nint stride, double* weight, int columns, nint rows)
    {
        for (nint i = 0; i < rows; i += 4)
        {
            Vector256<double> sum = Vector256.Load(y + i);
            for (int k = 0; k < columns; k++)
                sum = Fma.MultiplyAdd(Vector256.Abs(Vector256.Load(a + k * stride + i) * Vector256.Load(b + k * stride + i)), Vector256.Create(weight[k]), sum);
            sum.Store(y + i);
        }
    }

    public static void SolveTriangle(double* x, nint xStride, nint rows, double* triangle, nint triangleStride, double* inverse, int columns)
    {
        for (nint i = 0; i < rows; i += 4, x += 4)
        {
            Vector256<double> x0 = Vector256.Load(x);
            (x0 * Vector256.Create(inverse[0])).Store(x);
            if (columns == 1)
                continue;
            Vector256<double> x1 = Vector256.Load(x + xStride);
            x1 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[1]), x1);
            (x1 * Vector256.Create(inverse[1])).Store(x + xStride);
            if (columns == 2)
                continue;
            Vector256<double> x2 = Vector256.Load(x + 2 * xStride);
            x2 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[2]), x2);
            x2 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 2]), x2);
            (x2 * Vector256.Create(inverse[2])).Store(x + 2 * xStride);
            if (columns == 3)
                continue;
            Vector256<double> x3 = Vector256.Load(x + 3 * xStride);
            x3 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[3]), x3);
            x3 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 3]), x3);
            x3 = Fma.MultiplyAddNegated(x2, Vector256.Create(triangle[2 * triangleStride + 3]), x3);
            (x3 * Vector256.Create(inverse[3])).Store(x + 3 * xStride);
            if (columns == 4)
                continue;
            Vector256<double> x4 = Vector256.Load(x + 4 * xStride);
            x4 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[4]), x4);
            x4 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 4]), x4);
            x4 = Fma.MultiplyAddNegated(x2, Vector256.Create(triangle[2 * triangleStride + 4]), x4);
            x4 = Fma.MultiplyAddNegated(x3, Vector256.Create(triangle[3 * triangleStride + 4]), x4);
            (x4 * Vector256.Create(inverse[4])).Store(x + 4 * xStride);
            if (columns == 5)
                continue;
            Vector256<double> x5 = Vector256.Load(x + 5 * xStride);
            x5 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[5]), x5);
            x5 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 5]), x5);
            x5 = Fma.MultiplyAddNegated(x2, Vector256.Create(triangle[2 * triangleStride + 5]), x5);
            x5 = Fma.MultiplyAddNegated(x3, Vector256.Create(triangle[3 * triangleStride + 5]), x5);
            x5 = Fma.MultiplyAddNegated(x4, Vector256.Create(triangle[4 * triangleStride + 5]), x5);
            (x5 * Vector256.Create(inverse[5])).Store(x + 5 * xStride);
            if (columns == 6)
                continue;
            Vector256<double> x6 = Vector256.Load(x + 6 * xStride);
            x6 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[6]), x6);
            x6 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 6]), x6);
            x6 = Fma.MultiplyAddNegated(x2, Vector256.Create(triangle[2 * triangleStride + 6]), x6);
            x6 = Fma.MultiplyAddNegated(x3, Vector256.Create(triangle[3 * triangleStride + 6]), x6);
            x6 = Fma.MultiplyAddNegated(x4, Vector256.Create(triangle[4 * triangleStride + 6]), x6);
            x6 = Fma.MultiplyAddNegated(x5, Vector256.Create(triangle[5 * triangleStride + 6]), x6);
            (x6 * Vector256.Create(inverse[6])).Store(x + 6 * xStride);
            if (columns == 7)
                continue;
            Vector256<double> x7 = Vector256.Load(x + 7 * xStride);
            x7 = Fma.MultiplyAddNegated(x0, Vector256.Create(triangle[7]), x7);
            x7 = Fma.MultiplyAddNegated(x1, Vector256.Create(triangle[triangleStride + 7]), x7);
            x7 = Fma.MultiplyAddNegated(x2, Vector256.Create(triangle[2 * triangleStride + 7]), x7);
            x7 = Fma.MultiplyAddNegated(x3, Vector256.Create(triangle[3 * triangleStride + 7]), x7);
            x7 = Fma.MultiplyAddNegated(x4, Vector256.Create(triangle[4 * triangleStride + 7]), x7);
            x7 = Fma.MultiplyAddNegated(x5, Vector256.Create(triangle[5 * triangleStride + 7]), x7);
            x7 = Fma.MultiplyAddNegated(x6, Vector256.Create(triangle[6 * triangleStride + 7]), x7);
            (x7 * Vector256.Create(inverse[7])).Store(x + 7 * xStride);
        }
    }

    private static void Subtract8By4(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, int columns)
    {
        Vector256<double> c00 = Vector256.Load(c);
        Vector256<double> c10 = Vector256.Load(c + 4);
        Vector256<double> c01 = Vector256.Load(c + cStride);
        Vector256<double> c11 = Vector256.Load(c + cStride + 4);
        Vector256<double> c02 = Vector256.Load(c + 2 * cStride);
        Vector256<double> c12 = Vector256.Load(c + 2 * cStride + 4);
        Vector256<double> c03 = Vector256.Load(c + 3 * cStride);
        Vector256<double> c13 = Vector256.Load(c + 3 * cStride + 4);
        for (nint k = 0; k < depth; k++, a += aStride, packed += 8)
        {
            Vector256<double> a0 = Vector256.Load(a);
            Vector256<double> a1 = Vector256.Load(a + 4);
            Vector256<double> b = Vector256.Create(packed[0]);
            c00 = Fma.MultiplyAddNegated(a0, b, c00);
            c10 = Fma.MultiplyAddNegated(a1, b, c10);
            b = Vector256.Create(packed[1]);
            c01 = Fma.MultiplyAddNegated(a0, b, c01);
            c11 = Fma.MultiplyAddNegated(a1, b, c11);
            b = Vector256.Create(packed[2]);
            c02 = Fma.MultiplyAddNegated(a0, b, c02);
            c12 = Fma.MultiplyAddNegated(a1, b, c12);
            b = Vector256.Create(packed[3]);
            c03 = Fma.MultiplyAddNegated(a0, b, c03);
            c13 = Fma.MultiplyAddNegated(a1, b, c13);
        }
        c00.Store(c);
        c10.Store(c + 4);
        if (columns == 1)
            return;
        c01.Store(c + cStride);
        c11.Store(c + cStride + 4);
        if (columns == 2)
            return;
        c02.Store(c + 2 * cStride);
        c12.Store(c + 2 * cStride + 4);
        if (columns == 3)
            return;
        c03.Store(c + 3 * cStride);
        c13.Store(c + 3 * cStride + 4);
    }

    public static void SubtractLanes(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        for (; columns >= 4; columns -= 4, a += 4 * stride, x += 32)
            SubtractFourLanes(y, a, stride, x, rows);
        for (; columns > 0; columns--, a += stride, x += 8)
        {
            Vector256<double> x0 = Vector256.Load(x);
            Vector256<double> x1 = Vector256.Load(x + 4);
            for (nint i = 0; i < rows; i++)
            {
                Vector256<double> factor = Vector256.Create(a[i]);
                Fma.MultiplyAddNegated(factor, x0, Vector256.Load(y + 8 * i)).Store(y + 8 * i);
                Fma.MultiplyAddNegated(factor, x1, Vector256.Load(y + 8 * i + 4)).Store(y + 8 * i + 4);
            }
        }
    }

    public static void SubtractLaneDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        for (; columns >= 4; columns -= 4, a += 4 * stride, x += 32)
            SubtractFourLaneDots(x, a, stride, y, rows);
        for (; columns > 0; columns--, a += stride, x += 8)
        {
            Vector256<double> sum0 = Vector256<double>.Zero;
            Vector256<double> sum1 = Vector256<double>.Zero;
            for (nint i = 0; i < rows; i++)
            {
                Vector256<double> factor = Vector256.Create(a[i]);
                sum0 = Fma.MultiplyAdd(factor, Vector256.Load(y + 8 * i), sum0);
                sum1 = Fma.MultiplyAdd(factor, Vector256.Load(y + 8 * i + 4), sum1);
            }
            (Vector256.Load(x) - sum0).Store(x);
            (Vector256.Load(x + 4) - sum1).Store(x + 4);
        }
    }

    private static void SubtractFourLanes(double* y, double* a, nint stride, double* x, nint rows)
    {
        double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
        for (nint half = 0; half < 8; half += 4, x += 4, y += 4)
        {
            Vector256<double> x0 = Vector256.Load(x), x1 = Vector256.Load(x + 8), x2 = Vector256.Load(x + 16), x3 = Vector256.Load(x + 24);
            for (nint i = 0; i < rows; i++)
            {
                Vector256<double> value = Fma.MultiplyAddNegated(Vector256.Create(a[i]), x0, Vector256.Load(y + 8 * i));
                value = Fma.MultiplyAddNegated(Vector256.Create(a1[i]), x1, value);
                value = Fma.MultiplyAddNegated(Vector256.Create(a2[i]), x2, value);
                Fma.MultiplyAddNegated(Vector256.Create(a3[i]), x3, value).Store(y + 8 * i);
            }
        }
    }

    private static void SubtractFourLaneDots(double* x, double* a, nint stride, double* y, nint rows)
    {
        double* a1 = a + stride, a2 = a1 + stride, a3 = a2 + stride;
        for (nint half = 0; half < 8; half += 4, x += 4, y += 4)
        {
            Vector256<double> s0 = Vector256<double>.Zero, s1 = s0, s2 = s0, s3 = s0;
            for (nint i = 0; i < rows; i++)
            {
                Vector256<double> value = Vector256.Load(y + 8 * i);
                s0 = Fma.MultiplyAdd(Vector256.Create(a[i]), value, s0);
                s1 = Fma.MultiplyAdd(Vector256.Create(a1[i]), value, s1);
                s2 = Fma.MultiplyAdd(Vector256.Create(a2[i]), value, s2);
                s3 = Fma.MultiplyAdd(Vector256.Create(a3[i]), value, s3);
            }
            (Vector256.Load(x) - s0).Store(x);
            (Vector256.Load(x + 8) - s1).Store(x + 8);
            (Vector256.Load(x + 16) - s2).Store(x + 16);
            (Vector256.Load(x + 24) - s3).Store(x + 24);
        }
    }
}
