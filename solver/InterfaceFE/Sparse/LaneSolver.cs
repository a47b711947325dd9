namespace InterfaceFE.Sparse;

/// <summary>Substitution through the fronts of a path for eight vectors side by side: eight numbers for each place. Reads each panel once for all of them.</summary>
internal sealed unsafe class LaneSolver
{
    /// <summary>Vectors side by side.</summary>
    public const int Lanes = 8;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly AlignedBuffer _local;

    /// <summary>Makes room for one front.</summary>
    public LaneSolver(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _local = new AlignedBuffer((long)Lanes * (plan.LongestPanel + SparsePlan.Padding));
    }

    /// <summary>Forward substitution. Root places then have the right side of the Schur complement.</summary>
    /// <param name="x">Eight numbers for each place; only places on the path and in the root are touched.</param>
    /// <param name="fronts">Fronts, rising; with each its ancestors.</param>
    /// <param name="half">Half of the factor.</param>
    public void Forward(double* x, ReadOnlySpan<int> fronts, int half)
    {
        double* local = _local.Start;
        foreach (int front in fronts)
        {
            int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = _plan.Stride(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
            double* own = x + (nint)Lanes * _plan.First[front];
            new ReadOnlySpan<double>(own, Lanes * columns).CopyTo(new Span<double>(local, Lanes * columns));
            new Span<double>(local + Lanes * columns, Lanes * (stride - columns)).Clear();
            PanelSolve.ForwardLanes(_store.Panel(half, front), columns, stride, local);
            new ReadOnlySpan<double>(local, Lanes * columns).CopyTo(new Span<double>(own, Lanes * columns));
            for (int i = 0; i < rows; i++)
                DenseKernels.Add(x + (nint)Lanes * _plan.Rows[start + i], local + Lanes * (padded + i), Lanes);
        }
    }

    /// <summary>Division by the pivots and backward substitution; root places must have their solution.</summary>
    public void Backward(double* x, ReadOnlySpan<int> fronts)
    {
        double* local = _local.Start;
        for (int f = fronts.Length - 1; f >= 0; f--)
        {
            int front = fronts[f], first = _plan.First[front];
            int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = _plan.Stride(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
            double* own = x + (nint)Lanes * first, inverse = _store.Inverse + first;
            for (int j = 0; j < columns; j++)
                for (int lane = 0; lane < Lanes; lane++)
                    local[Lanes * j + lane] = own[Lanes * j + lane] * inverse[j];
            new Span<double>(local + Lanes * columns, Lanes * (stride - columns)).Clear();
            for (int i = 0; i < rows; i++)
                new ReadOnlySpan<double>(x + (nint)Lanes * _plan.Rows[start + i], Lanes).CopyTo(new Span<double>(local + Lanes * (padded + i), Lanes));
            PanelSolve.BackwardLanes(_store.Panel(_store.Halves - 1, front), columns, stride, local);
            new ReadOnlySpan<double>(local, Lanes * columns).CopyTo(new Span<double>(own, Lanes * columns));
        }
    }
}
