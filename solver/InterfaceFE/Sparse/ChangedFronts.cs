namespace InterfaceFE.Sparse;

/// <summary>
/// Which fronts have to be worked on again: those of replaced slots, their ancestors, and fronts whose contribution block is wanted above but was not kept. Such a block is kept
/// from then on, since change has spread to its neighbourhood.
/// </summary>
internal sealed class ChangedFronts
{
    private const byte OnPath = 1;
    private const byte Again = 2;

    private readonly SparsePlan _plan;
    private readonly FrontStore _store;
    private readonly byte[] _marks;

    /// <summary>Marks all fronts.</summary>
    public ChangedFronts(SparsePlan plan, FrontStore store)
    {
        _plan = plan;
        _store = store;
        _marks = new byte[plan.FrontCount + 1];
        MarkAll();
    }

    /// <summary>Whether nothing is marked.</summary>
    public bool IsEmpty { get; private set; }

    /// <summary>Whether all fronts are marked.</summary>
    public bool IsWhole { get; private set; }

    /// <summary>Marks all fronts.</summary>
    public void MarkAll()
    {
        _marks.AsSpan().Fill(OnPath);
        IsEmpty = false;
        IsWhole = true;
    }

    /// <summary>Marks a front and its ancestors.</summary>
    public void Mark(int front)
    {
        IsEmpty = false;
        // A top without rows has no parent, yet the root's numbers have to be looked at again after it.
        _marks[_plan.FrontCount] = OnPath;
        for (; front >= 0 && _marks[front] != OnPath; front = _plan.Parent[front])
            _marks[front] = OnPath;
    }

    /// <summary>
    /// Adds what the marked fronts need: fronts whose close looks at pivots depend on scales that moved, and those whose contribution block is gone. Returns the
    /// floating-point operations of all.
    /// </summary>
    public double Complete(UnknownScales scales)
    {
        if (!IsWhole && scales.AnyMoved)
            for (int front = NextLooked(0); front >= 0; front = NextLooked(front + 1))
                if (_marks[front] != OnPath && HasMovedRow(front, scales))
                    Mark(front);
        double work = 0;
        for (int front = Last(_plan.FrontCount + 1); front >= 0; front = Last(front))
        {
            if (front < _plan.FrontCount)
                work += _plan.Work[front];
            for (int c = _plan.ChildStart[front]; c < _plan.ChildStart[front + 1] && !IsWhole; c++)
            {
                int child = _plan.Children[c];
                if (_marks[child] != 0 || _store.IsKept(child) || _plan.RowCount(child) == 0)
                    continue;
                if (_marks[front] == OnPath)
                    _store.Keep(child);
                _marks[child] = Again;
            }
        }
        return work;
    }

    /// <summary>The first marked front from <paramref name="from"/> on and below <paramref name="end"/>; -1 for none.</summary>
    public int Next(int from, int end)
    {
        int found = _marks.AsSpan(from, end - from).IndexOfAnyExcept((byte)0);
        return found < 0 ? -1 : from + found;
    }

    /// <summary>Whether a front is marked.</summary>
    public bool Contains(int front) => _marks[front] != 0;

    /// <summary>Takes all marks off.</summary>
    public void Clear()
    {
        _marks.AsSpan().Clear();
        IsEmpty = true;
        IsWhole = false;
    }

    private int Last(int end) => _marks.AsSpan(0, end).LastIndexOfAnyExcept((byte)0);

    private int NextLooked(int from)
    {
        int found = _store.HasLooked.AsSpan(from).IndexOf(true);
        return found < 0 ? -1 : from + found;
    }

    private bool HasMovedRow(int front, UnknownScales scales)
    {
        for (int i = _plan.RowStart[front]; i < _plan.RowStart[front + 1]; i++)
            if (scales.HasMoved(_plan.Rows[i]))
                return true;
        return false;
    }
}
