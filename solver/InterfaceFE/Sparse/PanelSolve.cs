namespace InterfaceFE.Sparse;

/// <summary>Substitution with the unit triangle and the rows of one front's panel, on a local vector: pivots first, rows from the padded number of pivots on, a block of 8 to spare.</summary>
internal static unsafe class PanelSolve
{
    private const int Block = SparsePlan.Padding;

    /// <summary>local[pivots] becomes L⁻¹ local[pivots]; local[rows] -= L₂ local[pivots].</summary>
    public static void Forward(double* panel, int columns, nint stride, double* local)
    {
        for (int k = 0; k < columns; k += Block)
        {
            int width = Math.Min(Block, columns - k);
            double* block = panel + k * stride + k, y = local + k;
            for (int c = 0; c < width; c++)
                for (int i = c + 1; i < width; i++)
                    y[i] -= block[c * stride + i] * y[c];
            DenseKernels.SubtractColumns(y + Block, block + Block, stride, y, width, stride - k - Block);
        }
    }

    /// <summary>local[pivots] becomes L⁻ᵀ (local[pivots] - L₂ᵀ local[rows]).</summary>
    public static void Backward(double* panel, int columns, nint stride, double* local)
    {
        for (int k = (columns - 1) / Block * Block; k >= 0; k -= Block)
        {
            int width = Math.Min(Block, columns - k);
            double* block = panel + k * stride + k, y = local + k;
            DenseKernels.SubtractDots(y, block + Block, stride, y + Block, width, stride - k - Block);
            for (int c = width - 1; c >= 0; c--)
                for (int i = c + 1; i < width; i++)
                    y[c] -= block[c * stride + i] * y[i];
        }
    }

    /// <summary>The same as <see cref="Forward"/> for eight vectors side by side: local has 8 numbers for each pivot and row.</summary>
    public static void ForwardLanes(double* panel, int columns, nint stride, double* local)
    {
        for (int k = 0; k < columns; k += Block)
        {
            int width = Math.Min(Block, columns - k);
            double* block = panel + k * stride + k, y = local + (nint)Block * k;
            for (int c = 0; c < width; c++)
                DenseKernels.SubtractLanes(y + Block * (c + 1), block + c * stride + c + 1, stride, y + Block * c, 1, width - c - 1);
            DenseKernels.SubtractLanes(y + Block * Block, block + Block, stride, y, width, stride - k - Block);
        }
    }

    /// <summary>The same as <see cref="Backward"/> for eight vectors side by side.</summary>
    public static void BackwardLanes(double* panel, int columns, nint stride, double* local)
    {
        for (int k = (columns - 1) / Block * Block; k >= 0; k -= Block)
        {
            int width = Math.Min(Block, columns - k);
            double* block = panel + k * stride + k, y = local + (nint)Block * k;
            DenseKernels.SubtractLaneDots(y, block + Block, stride, y + Block * Block, width, stride - k - Block);
            for (int c = width - 1; c >= 0; c--)
                DenseKernels.SubtractLaneDots(y + Block * c, block + c * stride + c + 1, stride, y + Block * (c + 1), 1, width - c - 1);
        }
    }
}
