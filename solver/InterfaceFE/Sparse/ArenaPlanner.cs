namespace InterfaceFE.Sparse;

/// <summary>Places blocks of known life time in one array ahead of time: lowest free place first, so that the working set stays small and the same at each run.</summary>
internal sealed class ArenaPlanner
{
    private readonly List<(long Start, long Length)> _free = [];

    /// <summary>Length that the array must have.</summary>
    public long Length { get; private set; }

    /// <summary>Takes a block and returns its start.</summary>
    public long Take(long length)
    {
        for (int i = 0; i < _free.Count; i++)
        {
            (long start, long available) = _free[i];
            if (available < length)
                continue;
            if (available == length)
                _free.RemoveAt(i);
            else
                _free[i] = (start + length, available - length);
            return start;
        }
        if (_free.Count > 0 && _free[^1].Start + _free[^1].Length == Length)
        {
            long start = _free[^1].Start;
            _free.RemoveAt(_free.Count - 1);
            Length = start + length;
            return start;
        }
        Length += length;
        return Length - length;
    }

    /// <summary>Gives a block back.</summary>
    public void Release(long start, long length)
    {
        int at = 0;
        while (at < _free.Count && _free[at].Start < start)
            at++;
        _free.Insert(at, (start, length));
        if (at + 1 < _free.Count && start + length == _free[at + 1].Start)
        {
            _free[at] = (start, length + _free[at + 1].Length);
            _free.RemoveAt(at + 1);
        }
        if (at > 0 && _free[at - 1].Start + _free[at - 1].Length == start)
        {
            _free[at - 1] = (_free[at - 1].Start, _free[at - 1].Length + _free[at].Length);
            _free.RemoveAt(at);
        }
    }
}
