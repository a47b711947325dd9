namespace InterfaceFE.Sparse;

/// <summary>The kernels in plain loops, for any processor; see <see cref="DenseKernels"/> for what each does.</summary>
internal static unsafe class PortableKernels
{
    public static void SubtractProduct(double* a, nint aStride, double* packed, nint depth, double* c, nint cStride, nint rows, int columns)
    {
        for (int j = 0; j < columns; j++)
            for (nint k = 0; k < depth; k++)
            {
                double factor = packed[8 * k + j];
                for (nint i = 0; i < rows; i++)
                    c[j * cStride + i] -= a[k * aStride + i] * factor;
            }
    }

    public static void Pack(double* source, nint stride, double* factor, nint depth, double* packed)
    {
        for (nint k = 0; k < depth; k++)
            for (int j = 0; j < 8; j++)
                packed[8 * k + j] = source[k * stride + j] * factor[k];
    }

    public static void SolveTriangle(double* x, nint xStride, nint rows, double* triangle, nint triangleStride, double* inverse, int columns)
    {
        double* unscaled = stackalloc double[8];
        for (nint i = 0; i < rows; i++)
            for (int k = 0; k < columns; k++)
            {
                double value = x[k * xStride + i];
                for (int j = 0; j < k; j++)
                    value -= unscaled[j] * triangle[j * triangleStride + k];
                unscaled[k] = value;
                x[k * xStride + i] = value * inverse[k];
            }
    }

    public static void Add(double* target, double* source, nint count)
    {
        for (nint i = 0; i < count; i++)
            target[i] += source[i];
    }

    public static void SubtractColumns(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        for (int k = 0; k < columns; k++)
            for (nint i = 0; i < rows; i++)
                y[i] -= a[k * stride + i] * x[k];
    }

    public static void SubtractDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        for (int k = 0; k < columns; k++)
        {
            double sum = 0;
            for (nint i = 0; i < rows; i++)
                sum += a[k * stride + i] * y[i];
            x[k] -= sum;
        }
    }

    public static void AddAbsoluteProducts(double* y, double* a, double* b, nint stride, double* weight, int columns, nint rows)
    {
        for (int k = 0; k < columns; k++)
            for (nint i = 0; i < rows; i++)
                y[i] += Math.Abs(a[k * stride + i] * b[k * stride + i]) * weight[k];
    }

    public static void SubtractLanes(double* y, double* a, nint stride, double* x, int columns, nint rows)
    {
        for (int k = 0; k < columns; k++)
            for (nint i = 0; i < rows; i++)
                for (int lane = 0; lane < 8; lane++)
                    y[8 * i + lane] -= a[k * stride + i] * x[8 * k + lane];
    }

    public static void SubtractLaneDots(double* x, double* a, nint stride, double* y, int columns, nint rows)
    {
        for (int k = 0; k < columns; k++)
            for (int lane = 0; lane < 8; lane++)
            {
                double sum = 0;
                for (nint i = 0; i < rows; i++)
                    sum += a[k * stride + i] * y[8 * i + lane];
                x[8 * k + lane] -= sum;
            }
    }
}
