namespace InterfaceFE.Sparse;

/// <summary>Substitution through the fronts of a path, for one vector by place.</summary>
internal sealed unsafe class FrontSolver
{
    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly AlignedBuffer _local;

    /// <summary>Makes room for one front.</summary>
    public FrontSolver(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _local = new AlignedBuffer(plan.LongestPanel + SparsePlan.Padding);
    }

    /// <summary>Forward substitution. Root places then have the right side of the Schur complement.</summary>
    public void Forward(double* x, FrontPath path)
    {
        double* local = _local.Start;
        foreach (int front in path.Fronts)
        {
            int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = _plan.Stride(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
            double* own = x + _plan.First[front];
            for (int j = 0; j < stride; j++)
                local[j] = j < columns ? own[j] : 0;
            PanelSolve.Forward(_store.Panel(0, front), columns, stride, local);
            for (int j = 0; j < columns; j++)
                own[j] = local[j];
            fixed (int* row = _plan.Rows)
                for (int i = 0; i < rows; i++)
                    x[row[start + i]] += local[padded + i];
        }
    }

    /// <summary>Division by the pivots and backward substitution; root places must have their solution.</summary>
    public void Backward(double* x, FrontPath path)
    {
        double* local = _local.Start;
        for (int f = path.Fronts.Length - 1; f >= 0; f--)
        {
            int front = path.Fronts[f], first = _plan.First[front];
            int columns = _plan.Columns(front), padded = _plan.PaddedColumns(front), stride = _plan.Stride(front), start = _plan.RowStart[front], rows = _plan.RowCount(front);
            double* own = x + first, inverse = _store.Inverse + first;
            for (int j = 0; j < padded; j++)
                local[j] = j < columns ? own[j] * inverse[j] : 0;
            fixed (int* row = _plan.Rows)
                for (int i = 0; i < rows; i++)
                    local[padded + i] = x[row[start + i]];
            for (int i = padded + rows; i < stride; i++)
                local[i] = 0;
            PanelSolve.Backward(_store.Panel(_store.Halves - 1, front), columns, stride, local);
            for (int j = 0; j < columns; j++)
                own[j] = local[j];
        }
    }
}
