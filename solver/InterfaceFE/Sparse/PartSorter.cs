namespace InterfaceFE.Sparse;

/// <summary>
/// Sorts the vertices of a part along its axes of inertia or by their distance in the graph from a far end. Keys are rounded to a grid so that rows of a mesh tie; ties are
/// broken across, then by the order that the vertices came in.
/// </summary>
internal sealed class PartSorter
{
    private const int KeyBits = 26;
    private const double SlendernessForOneAxis = 16;

    private readonly VertexGraph _graph;
    private readonly double[] _x;
    private readonly double[] _y;
    private readonly Side[] _side;
    private readonly int[] _level;
    private readonly int[] _queue;
    private readonly long[] _keys;
    private double _ux;
    private double _uy;

    /// <summary>Prepares for parts of up to <paramref name="interior"/> vertices.</summary>
    public PartSorter(VertexGraph graph, SlotPattern pattern, Side[] side, int interior)
    {
        _graph = graph;
        _x = pattern.VertexX;
        _y = pattern.VertexY;
        _side = side;
        _level = new int[graph.Count];
        _queue = new int[interior];
        _keys = new long[interior];
    }

    /// <summary>Whether the part is so long that sorting it across its length is of no use.</summary>
    public bool IsSlender { get; private set; }

    /// <summary>Takes the axes of the part that the next calls speak of.</summary>
    public void SetAxes(ReadOnlySpan<int> part)
    {
        double mx = 0, my = 0, a = 0, b = 0, c = 0;
        foreach (int v in part)
        {
            mx += _x[v];
            my += _y[v];
        }
        mx /= part.Length;
        my /= part.Length;
        foreach (int v in part)
        {
            double dx = _x[v] - mx, dy = _y[v] - my;
            a += dx * dx;
            b += dx * dy;
            c += dy * dy;
        }
        (_ux, _uy) = a >= c ? (1, 0) : (0, 1);
        // Parts that lie along x or y keep these as exact axes, so that rows of a mesh tie.
        if (Math.Abs(b) >= 1e-6 * (a + c))
            (_uy, _ux) = Math.SinCos(0.5 * Math.Atan2(2 * b, a - c));
        double major = a * _ux * _ux + 2 * b * _ux * _uy + c * _uy * _uy;
        IsSlender = major > SlendernessForOneAxis * (a + c - major);
    }

    /// <summary>Sorts along the major axis.</summary>
    public void SortAlong(ReadOnlySpan<int> part, Span<int> sorted) => Sort(part, sorted, _ux, _uy, byLevel: false);

    /// <summary>Sorts along the minor axis.</summary>
    public void SortAcross(ReadOnlySpan<int> part, Span<int> sorted) => Sort(part, sorted, -_uy, _ux, byLevel: false);

    /// <summary>Sorts by distance in the graph from a far end of the part; unconnected pieces follow one after the other.</summary>
    public void SortByDistance(ReadOnlySpan<int> part, Span<int> sorted)
    {
        SetLevels(part);
        Sort(part, sorted, _ux, _uy, byLevel: true);
    }

    /// <summary>Key: first coordinate along (ux, uy), or graph level, then the coordinate across.</summary>
    private void Sort(ReadOnlySpan<int> part, Span<int> sorted, double ux, double uy, bool byLevel)
    {
        double lowAlong = double.MaxValue, highAlong = double.MinValue, lowAcross = double.MaxValue, highAcross = double.MinValue;
        foreach (int v in part)
        {
            double along = _x[v] * ux + _y[v] * uy, across = _y[v] * ux - _x[v] * uy;
            lowAlong = Math.Min(lowAlong, along);
            highAlong = Math.Max(highAlong, along);
            lowAcross = Math.Min(lowAcross, across);
            highAcross = Math.Max(highAcross, across);
        }
        double extent = Math.Max(highAlong - lowAlong, highAcross - lowAcross);
        double scale = extent > 0 ? (1 << KeyBits) / extent : 0;
        for (int i = 0; i < part.Length; i++)
        {
            int v = part[i];
            long along = byLevel ? _level[v] : (long)Math.Round((_x[v] * ux + _y[v] * uy - lowAlong) * scale);
            long across = (long)Math.Round((_y[v] * ux - _x[v] * uy - lowAcross) * scale);
            _keys[i] = (along << (KeyBits + 2)) + across;
            sorted[i] = v;
        }
        _keys.AsSpan(0, part.Length).Sort(sorted[..part.Length]);
    }

    private void SetLevels(ReadOnlySpan<int> part)
    {
        int start = part[0];
        double lowest = double.MaxValue;
        foreach (int v in part)
        {
            double along = _x[v] * _ux + _y[v] * _uy;
            if (along >= lowest)
                continue;
            lowest = along;
            start = v;
        }
        for (int pass = 0; pass < 2; pass++)
        {
            foreach (int v in part)
                _level[v] = -1;
            int filled = 0, next = 0, level = 0;
            while (true)
            {
                filled = Spread(start, filled, level);
                if (filled == part.Length)
                    break;
                level = _level[_queue[filled - 1]] + 1;
                while (_level[part[next]] >= 0)
                    next++;
                start = part[next];
            }
            start = _queue[filled - 1];
        }
    }

    private int Spread(int start, int filled, int level)
    {
        int head = filled;
        _queue[filled++] = start;
        _level[start] = level;
        while (head < filled)
        {
            int v = _queue[head++];
            for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            {
                int w = _graph.Neighbours[p];
                if (_side[w] == Side.Outside || _level[w] >= 0)
                    continue;
                _level[w] = _level[v] + 1;
                _queue[filled++] = w;
            }
        }
        return filled;
    }
}
