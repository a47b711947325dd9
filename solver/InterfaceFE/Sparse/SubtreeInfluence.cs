namespace InterfaceFE.Sparse;

/// <summary>
/// For each large subtree, how its samples follow the values at the rows of its top front while all of it is in balance: value = Σ influence · row value. Made when asked for,
/// valid until the front is worked on again, and a function of the subtree's present numbers alone.
/// </summary>
internal sealed unsafe class SubtreeInfluence
{
    private const int Lanes = SubtreeSamples.Most * SubtreeSamples.Unknowns;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly AlignedBuffer[] _influence;
    private readonly long[] _start;
    private readonly bool[] _isFresh;

    /// <summary>Makes room for the influence of all large subtrees.</summary>
    public SubtreeInfluence(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _start = new long[plan.FrontCount];
        long length = 0;
        foreach (int front in plan.Samples.Large)
        {
            _start[front] = length;
            length += (long)Lanes * plan.RowCount(front);
        }
        _influence = new AlignedBuffer[store.Halves];
        for (int half = 0; half < store.Halves; half++)
            _influence[half] = new AlignedBuffer(length);
        _isFresh = new bool[plan.FrontCount];
    }

    /// <summary>The front's numbers are about to change.</summary>
    public void Spoil(int front) => _isFresh[front] = false;

    /// <summary>Influence of the rows of a front with a large subtree on its samples: eight numbers for each row.</summary>
    /// <param name="half">Half of the factor.</param>
    /// <param name="front">The front.</param>
    /// <param name="local">Room for eight numbers for each place of a front's column; two columns.</param>
    public double* Of(int half, int front, double* local)
    {
        if (!_isFresh[front])
        {
            int[] large = _plan.Samples.Large;
            int from = Array.BinarySearch(large, _plan.FirstDescendant[front]);
            for (int i = from < 0 ? ~from : from; large[i] < front; i++)
                Refresh(large[i], local);
            Refresh(front, local);
        }
        return _influence[half].Start + _start[front];
    }

    private void Refresh(int front, double* local)
    {
        if (_isFresh[front])
            return;
        for (int half = 0; half < _store.Halves; half++)
            Make(half, front, local, local + (nint)Lanes * _plan.LongestPanel);
        _isFresh[front] = true;
    }

    private void Make(int half, int front, double* local, double* childLocal)
    {
        SubtreeSamples samples = _plan.Samples;
        int stride = _plan.Stride(front), padded = _plan.PaddedColumns(front);
        new Span<double>(local, Lanes * stride).Clear();
        for (int i = samples.Start[front]; i < samples.Start[front + 1]; i++)
        {
            int lane = SubtreeSamples.Unknowns * (i - samples.Start[front]);
            SubtreeSamples.Sample sample = samples[i];
            int child = sample.Source;
            if (child == front)
                SetUnit(sample, local + lane);
            else if (samples.IsLarge[child])
                AddRows(child, _influence[half].Start + _start[child] + sample.Number, local + lane, sample.Count);
            else
            {
                new Span<double>(childLocal, Lanes * _plan.Stride(child)).Clear();
                SetUnit(sample, childLocal);
                PanelSolve.ForwardLanes(_store.Panel(half, child), _plan.Columns(child), _plan.Stride(child), childLocal);
                AddRows(child, childLocal + Lanes * _plan.PaddedColumns(child), local + lane, sample.Count);
            }
        }
        PanelSolve.ForwardLanes(_store.Panel(half, front), _plan.Columns(front), stride, local);
        int count = Lanes * _plan.RowCount(front);
        new ReadOnlySpan<double>(local + Lanes * padded, count).CopyTo(new Span<double>(_influence[half].Start + _start[front], count));
    }

    private static void SetUnit(in SubtreeSamples.Sample sample, double* local)
    {
        for (int unknown = 0; unknown < sample.Count; unknown++)
            local[Lanes * (sample.Number + unknown) + unknown] = 1;
    }

    private void AddRows(int child, double* rows, double* local, int count)
    {
        RunMap runs = _plan.Runs;
        for (int a = runs.Begin[child]; a < runs.End[child]; a++)
            for (int i = 0; i < runs.Length[a]; i++)
                for (int unknown = 0; unknown < count; unknown++)
                    local[Lanes * (runs.Target[a] + i) + unknown] += rows[Lanes * (runs.Source[a] + i) + unknown];
    }
}
