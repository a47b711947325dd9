namespace InterfaceFE.Sparse;

/// <summary>
/// Factors the fronts that changed, branch by branch, on one thread or two, then the fronts above the branches. Each front is summed anew from its slots and its children's
/// blocks, so that a partial run leaves the same bytes as a whole one, whatever was changed before and whoever did the work.
/// </summary>
internal sealed unsafe class FrontFactor : IThreadPoolWorkItem
{
    // Work below which waking a second thread costs more than it saves.
    private const double WorkForTwo = 2e7;

    private readonly SparsePlan _plan;
    private readonly SlotValues _values;
    private readonly FrontStore _store;
    private readonly SubtreeInfluence _influence;
    private readonly FrontWorker _worker;
    private readonly int[] _faults;
    private readonly ChangedFronts _changed;
    private FrontWorker? _helper;
    private int _nextBranch;
    private int _doneBranches;
    private int _isHelping;

    /// <summary>Makes room for the factor.</summary>
    public FrontFactor(SparsePlan plan, SlotValues values, bool isSymmetric)
    {
        _plan = plan;
        _values = values;
        _store = new FrontStore(plan, isSymmetric);
        _influence = new SubtreeInfluence(plan, _store);
        _worker = new FrontWorker(plan, values, _store, _influence);
        _faults = new int[plan.Branches.Branches.Length];
        _changed = new ChangedFronts(plan, _store);
        Look = new PivotLook(plan, _store, _influence);
        _nextBranch = _faults.Length;
    }

    /// <summary>Numbers of the factor.</summary>
    public FrontStore Store => _store;

    /// <summary>Close looks at the root's pivots.</summary>
    public PivotLook Look { get; }

    /// <summary>Whether no front waits to be worked on.</summary>
    public bool IsUpToDate => _changed.IsEmpty;

    /// <summary>What was noted of the pivots outside the root.</summary>
    public PivotTally Tally { get; private set; }

    /// <summary>Place of a pivot that is not finite; -1 for none.</summary>
    public int FirstNotFinite { get; private set; } = -1;

    /// <summary>Whether a second thread may help.</summary>
    public bool MayShare { get; set; }

    /// <summary>Column length of the root block.</summary>
    public int RootStride => _plan.PaddedColumns(_plan.FrontCount);

    /// <summary>Lower triangle of the root's Schur complement (half 0), or the transposed upper one (half 1), column-major.</summary>
    public double* Root(int half) => _store.Panel(half, _plan.FrontCount);

    /// <summary>Scale of an unknown by place; never zero.</summary>
    public double Scale(int place) => _values.Scales[place];

    /// <summary>A slot was replaced.</summary>
    public void MarkSlot(int slot)
    {
        if (_plan.Slots.Front[slot] is int front and >= 0)
            _changed.Mark(front);
    }

    /// <summary>All fronts are to be worked on in the next run.</summary>
    public void MarkAll() => _changed.MarkAll();

    /// <summary>Works on the marked fronts with the slots' present numbers. A branch ends early at its first pivot that is not finite; everything is marked again then. Returns the floating-point operations.</summary>
    public double Run()
    {
        _values.Scales.Update();
        double work = _changed.Complete(_values.Scales);
        FirstNotFinite = -1;
        RunBranches(MayShare && work >= WorkForTwo && _faults.Length > 1);
        foreach (int fault in _faults)
            Note(fault);
        foreach (int front in _plan.Branches.Tops)
            if (FirstNotFinite < 0 && _changed.Contains(front))
                Note(_worker.Process(front));
        if (FirstNotFinite >= 0)
        {
            _changed.MarkAll();
            return work;
        }
        _worker.AssembleRoot();
        PivotTally tally = PivotTally.Empty;
        foreach (int front in _plan.LastFronts)
            tally.Join(_store.Tallies[front]);
        Tally = tally;
        _changed.Clear();
        return work;
    }

    /// <summary>A second thread's share of the branches.</summary>
    void IThreadPoolWorkItem.Execute()
    {
        // A thread that comes late, perhaps in the midst of the next run, finds branches or none; two never use one worker.
        if (Interlocked.Exchange(ref _isHelping, 1) == 1)
            return;
        TakeBranches(_helper!);
        Volatile.Write(ref _isHelping, 0);
    }

    private void RunBranches(bool isShared)
    {
        _doneBranches = 0;
        if (isShared)
            _helper ??= new FrontWorker(_plan, _values, _store, _influence);
        Volatile.Write(ref _nextBranch, 0);
        if (isShared)
            ThreadPool.UnsafeQueueUserWorkItem(this, preferLocal: false);
        TakeBranches(_worker);
        var wait = new SpinWait();
        while (Volatile.Read(ref _doneBranches) < _faults.Length)
            wait.SpinOnce(sleep1Threshold: -1);
    }

    private void TakeBranches(FrontWorker worker)
    {
        for (int branch = Interlocked.Increment(ref _nextBranch) - 1; branch < _faults.Length; branch = Interlocked.Increment(ref _nextBranch) - 1)
        {
            (int first, int end) = _plan.Branches.Branches[branch];
            int fault = -1;
            for (int front = _changed.Next(first, end); front >= 0 && fault < 0; front = front + 1 < end ? _changed.Next(front + 1, end) : -1)
                fault = worker.Process(front);
            _faults[branch] = fault;
            Interlocked.Increment(ref _doneBranches);
        }
    }

    private void Note(int fault)
    {
        if (fault >= 0 && (FirstNotFinite < 0 || fault < FirstNotFinite))
            FirstNotFinite = fault;
    }
}
