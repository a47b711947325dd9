namespace InterfaceFE.Sparse;

/// <summary>
/// The close look at a small pivot: how much round-off its forming may have left in it. With v the vector that the pivot is the energy of (1 at its unknown, 0 at later ones,
/// in balance at earlier ones), an error e in the diagonal of unknown i shows as e v²; each diagonal's own error is a unit round-off of the magnitudes that went into it, and
/// errors of many unknowns add as squares. First-order analysis of the factor's backward error, derived here. v is followed through a few levels of fronts only: the values on
/// the separators stand for the parts below them, since what is in balance lies between its ends.
/// </summary>
internal sealed unsafe class PivotLook
{
    // The upper levels cut the body into some thirty parts, enough for a rigid turn's v² to be summed within a few parts in a hundred.
    private const int Levels = 5;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly AlignedBuffer[] _probes;
    private readonly AlignedBuffer _local;

    /// <summary>Makes room for the probes.</summary>
    public PivotLook(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _probes = new AlignedBuffer[store.Halves];
        for (int half = 0; half < store.Halves; half++)
            _probes[half] = new AlignedBuffer(plan.UnknownCount);
        _local = new AlignedBuffer(plan.LongestPanel + SparsePlan.Padding);
    }

    /// <summary>Round-off that the pivot of a column may carry.</summary>
    /// <param name="front">Front whose columns before this one are done.</param>
    /// <param name="column">The column.</param>
    /// <param name="size">Sums of magnitudes of the front's own pivots so far.</param>
    public double Noise(int front, int column, double* size)
    {
        int first = _plan.First[front];
        for (int half = 0; half < _store.Halves; half++)
        {
            double* v = _probes[half].Start + first, panel = _store.Panel(half, front);
            nint stride = _plan.Stride(front);
            v[column] = 1;
            for (int c = column - 1; c >= 0; c--)
            {
                v[c] = 0;
                for (int i = c + 1; i <= column; i++)
                    v[c] -= panel[c * stride + i] * v[i];
            }
            for (int c = column + 1; c < _plan.Columns(front); c++)
                v[c] = 0;
            for (int i = _plan.RowStart[front]; i < _plan.RowStart[front + 1]; i++)
                _probes[half].Start[_plan.Rows[i]] = 0;
        }
        double sum = SumOf(first, column + 1, size);
        for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
            sum += Follow(_plan.Children[c], Levels);
        return PivotJudge.RoundOff * Math.Sqrt(sum);
    }

    /// <summary>The same for a pivot of the root block: <paramref name="left"/> and <paramref name="right"/> give its vectors at the root unknowns, <paramref name="size"/> their sums of magnitudes.</summary>
    public double RootNoise(ReadOnlySpan<double> left, ReadOnlySpan<double> right, double* size)
    {
        int interior = _plan.InteriorUnknownCount;
        left.CopyTo(new Span<double>(_probes[0].Start + interior, left.Length));
        right.CopyTo(new Span<double>(_probes[^1].Start + interior, right.Length));
        double sum = SumOf(interior, left.Length, size);
        for (int c = _plan.ChildStart[_plan.FrontCount]; c < _plan.ChildStart[_plan.FrontCount + 1]; c++)
            sum += Follow(_plan.Children[c], Levels + 1);
        return PivotJudge.RoundOff * Math.Sqrt(sum);
    }

    private double Follow(int front, int levels)
    {
        int first = _plan.First[front], columns = _plan.Columns(front), start = _plan.RowStart[front], rows = _plan.RowCount(front), padded = _plan.PaddedColumns(front);
        int stride = _plan.Stride(front);
        double* local = _local.Start;
        for (int half = 0; half < _store.Halves; half++)
        {
            double* v = _probes[half].Start;
            new Span<double>(local, stride).Clear();
            for (int i = 0; i < rows; i++)
                local[padded + i] = v[_plan.Rows[start + i]];
            PanelSolve.Backward(_store.Panel(half, front), columns, stride, local);
            for (int j = 0; j < columns; j++)
                v[first + j] = local[j];
        }
        double sum = SumOf(first, columns, _store.Sizes + first);
        if (levels == 0)
            return sum * (_plan.First[front + 1] - _plan.First[_plan.FirstDescendant[front]]) / columns;
        for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
            sum += Follow(_plan.Children[c], levels - 1);
        return sum;
    }

    private double SumOf(int first, int count, double* size)
    {
        double* left = _probes[0].Start + first, right = _probes[^1].Start + first;
        double sum = 0;
        for (int i = 0; i < count; i++)
        {
            double error = left[i] * right[i] * size[i];
            sum += error * error;
        }
        return sum;
    }
}
