namespace InterfaceFE.Sparse;

/// <summary>
/// The close look at a small pivot: how much round-off its forming may have left in it. With v the vector that the pivot is the energy of (1 at its unknown, 0 at later ones,
/// in balance at earlier ones), an error e in the diagonal of unknown i shows as e v²; each diagonal's own error is a unit round-off of the magnitudes that went into it, and
/// errors of many unknowns add as squares. First-order analysis of the factor's backward error, derived here. Below the front the sum runs over samples of the subtrees.
/// </summary>
internal sealed unsafe class PivotLook
{
    private const int Lanes = SubtreeSamples.Most * SubtreeSamples.Unknowns;
    private const int LargestExponent = 1000;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly SubtreeInfluence _influence;
    private readonly AlignedBuffer[] _vectors;
    private readonly AlignedBuffer _local;
    private readonly AlignedBuffer _lanes;
    private readonly AlignedBuffer[] _samples;
    private double _inverseUnit;

    /// <summary>Makes room for the vectors of one front.</summary>
    public PivotLook(SparsePlan plan, FrontStore store, SubtreeInfluence influence)
    {
        _plan = plan;
        _store = store;
        _influence = influence;
        _vectors = new AlignedBuffer[store.Halves];
        _samples = new AlignedBuffer[store.Halves];
        for (int half = 0; half < store.Halves; half++)
        {
            _vectors[half] = new AlignedBuffer(plan.LongestPanel + SparsePlan.Padding);
            _samples[half] = new AlignedBuffer(Lanes);
        }
        _local = new AlignedBuffer(plan.LongestPanel + SparsePlan.Padding);
        _lanes = new AlignedBuffer(2L * Lanes * plan.LongestPanel);
    }

    /// <summary>Round-off that the pivot of a column may carry.</summary>
    /// <param name="front">Front whose columns before this one are done.</param>
    /// <param name="column">The column.</param>
    /// <param name="size">Sums of magnitudes of the front's own pivots so far.</param>
    public double Noise(int front, int column, double* size)
    {
        for (int half = 0; half < _store.Halves; half++)
        {
            double* v = _vectors[half].Start;
            new Span<double>(v, _plan.Stride(front)).Clear();
            v[column] = 1;
            PanelSolve.Backward(_store.Panel(half, front), column + 1, _plan.Stride(front), v);
        }
        return Sum(front, column + 1, size, size[column]);
    }

    /// <summary>The same for a pivot of the root block: <paramref name="left"/> and <paramref name="right"/> give its vectors at the root unknowns.</summary>
    public double RootNoise(ReadOnlySpan<double> left, ReadOnlySpan<double> right)
    {
        left.CopyTo(new Span<double>(_vectors[0].Start, left.Length));
        right.CopyTo(new Span<double>(_vectors[^1].Start, right.Length));
        return Sum(_plan.FrontCount, left.Length, _store.Sizes + _plan.InteriorUnknownCount, 1);
    }

    /// <summary>Root of the squared errors of a front's first pivots and of all that is below, summed in a unit (a power of two) near the given size, so that squares stay in range.</summary>
    private double Sum(int front, int count, double* size, double near)
    {
        double sum = 0, unit = double.IsFinite(near) ? Math.ScaleB(1, Math.Clamp(Math.ILogB(near), -LargestExponent, LargestExponent)) : 1;
        _inverseUnit = 1 / unit;
        for (int i = 0; i < count; i++)
            sum += SquaredError(_vectors[0].Start[i], _vectors[^1].Start[i], size[i]);
        for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1]; c++)
        {
            int child = _plan.Children[c];
            sum += _plan.Samples.IsLarge[child] ? SumOfLarge(child, count) : SumOfSmall(child, count);
        }
        return PivotJudge.RoundOff * Math.Sqrt(sum) * unit;
    }

    private double SumOfLarge(int child, int count)
    {
        RunMap runs = _plan.Runs;
        for (int half = 0; half < _store.Halves; half++)
        {
            double* influence = _influence.Of(half, child, _lanes.Start), value = _samples[half].Start;
            new Span<double>(value, Lanes).Clear();
            for (int a = runs.Begin[child]; a < runs.End[child] && runs.Target[a] < count; a++)
                DenseKernels.SubtractLanes(value, _vectors[half].Start + runs.Target[a], 1, influence + Lanes * runs.Source[a], Math.Min(runs.Length[a], count - runs.Target[a]), 1);
        }
        SubtreeSamples samples = _plan.Samples;
        double sum = 0;
        for (int i = samples.Start[child]; i < samples.Start[child + 1]; i++)
        {
            int lane = SubtreeSamples.Unknowns * (i - samples.Start[child]);
            double squares = 0;
            for (int unknown = 0; unknown < samples[i].Count; unknown++)
                squares += SquaredError(_samples[0].Start[lane + unknown], _samples[^1].Start[lane + unknown], _store.Sizes[samples[i].Place + unknown]);
            sum += samples[i].Weight * squares / samples[i].Count;
        }
        return sum;
    }

    private double SumOfSmall(int child, int count)
    {
        RunMap runs = _plan.Runs;
        int columns = _plan.Columns(child), padded = _plan.PaddedColumns(child), first = _plan.First[child];
        double* local = _local.Start, right = _lanes.Start;
        for (int half = _store.Halves - 1; half >= 0; half--)
        {
            new Span<double>(local, _plan.Stride(child)).Clear();
            for (int a = runs.Begin[child]; a < runs.End[child] && runs.Target[a] < count; a++)
                for (int i = 0; i < runs.Length[a] && runs.Target[a] + i < count; i++)
                    local[padded + runs.Source[a] + i] = _vectors[half].Start[runs.Target[a] + i];
            PanelSolve.Backward(_store.Panel(half, child), columns, _plan.Stride(child), local);
            if (half == _store.Halves - 1)
                new ReadOnlySpan<double>(local, columns).CopyTo(new Span<double>(right, columns));
        }
        double sum = 0;
        for (int i = 0; i < columns; i++)
            sum += SquaredError(local[i], right[i], _store.Sizes[first + i]);
        return sum * SubtreeSamples.SubtreeUnknowns(_plan, child) / columns;
    }

    private double SquaredError(double left, double right, double size)
    {
        double error = size * _inverseUnit * left * right;
        return error * error;
    }
}
