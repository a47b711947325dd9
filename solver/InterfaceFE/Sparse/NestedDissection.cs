namespace InterfaceFE.Sparse;

/// <summary>
/// Fill-reducing ordering by nested dissection on vertex coordinates (A. George, SIAM J. Numer. Anal. 10 (1973) 345, for the idea). A part is sorted by several keys
/// (major axis of inertia, minor axis where the part is not slender, distance in the graph); one sweep over each sorted part gives the one-sided vertex separator of every
/// cut, and the cheapest balanced one is taken. Small parts are ordered by minimum degree. The result depends on the pattern alone.
/// </summary>
internal sealed class NestedDissection
{
    private const double SmallestShare = 0.3;
    private const double SlendernessForOneAxis = 16;
    private const int KeyBits = 26;

    private readonly VertexGraph _graph;
    private readonly double[] _x;
    private readonly double[] _y;
    private readonly int _leafVertices;
    private readonly LeafOrdering _leaves;
    private readonly int[] _stamp;
    private readonly int[] _position;
    private readonly int[] _level;
    private readonly int[] _queue;
    private readonly long[] _keys;
    private readonly int[] _leftChange;
    private readonly int[] _rightChange;
    private int[] _sorted;
    private int[] _best;
    private int _stampNow;

    private NestedDissection(VertexGraph graph, SlotPattern pattern, int interior, PlanOptions options)
    {
        _graph = graph;
        _x = pattern.VertexX;
        _y = pattern.VertexY;
        _leafVertices = Math.Max(1, options.LeafVertices);
        _leaves = new LeafOrdering(graph, pattern.IsChangeable);
        _stamp = new int[graph.Count];
        _position = new int[graph.Count];
        _level = new int[graph.Count];
        _queue = new int[interior];
        _keys = new long[interior];
        _sorted = new int[interior];
        _best = new int[interior];
        _leftChange = new int[interior + 1];
        _rightChange = new int[interior + 1];
    }

    /// <summary>Elimination order of the vertices that are not root and carry unknowns.</summary>
    public static int[] Order(VertexGraph graph, SlotPattern pattern, PlanOptions options)
    {
        var vertices = new List<int>(graph.Count);
        for (int v = 0; v < graph.Count; v++)
            if (!pattern.IsRoot[v] && graph.Weight[v] > 0)
                vertices.Add(v);
        int[] order = vertices.ToArray();
        new NestedDissection(graph, pattern, order.Length, options).Dissect(order);
        return order;
    }

    /// <summary>Rearranges a part into left, right, separator, each ordered in turn.</summary>
    private void Dissect(Span<int> part)
    {
        if (part.Length <= _leafVertices)
        {
            _leaves.Order(part);
            return;
        }
        Axes axes = Axes.Of(part, _x, _y);
        Cut cut = new(double.MaxValue, 0, true);
        SortByAxis(part, axes.Ux, axes.Uy);
        Sweep(part.Length, ref cut);
        if (!axes.IsSlender)
        {
            SortByAxis(part, -axes.Uy, axes.Ux);
            Sweep(part.Length, ref cut);
        }
        SortByDistance(part, axes);
        Sweep(part.Length, ref cut);
        (int left, int right) = Divide(part, cut);
        Dissect(part[..left]);
        Dissect(part.Slice(left, right));
    }

    private void SortByAxis(ReadOnlySpan<int> part, double ux, double uy)
    {
        part.CopyTo(_sorted);
        FillKeys(part, ux, uy, byLevel: false);
        Array.Sort(_keys, _sorted, 0, part.Length);
    }

    private void SortByDistance(ReadOnlySpan<int> part, in Axes axes)
    {
        SetLevels(part, axes);
        part.CopyTo(_sorted);
        FillKeys(part, axes.Ux, axes.Uy, byLevel: true);
        Array.Sort(_keys, _sorted, 0, part.Length);
    }

    /// <summary>Key: first coordinate along (ux, uy), or graph level, then the coordinate across; both rounded to a grid so that rows of a mesh tie.</summary>
    private void FillKeys(ReadOnlySpan<int> part, double ux, double uy, bool byLevel)
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
        }
    }

    /// <summary>Distances in the graph from a far end of the part; unconnected pieces follow one after the other.</summary>
    private void SetLevels(ReadOnlySpan<int> part, in Axes axes)
    {
        int start = part[0];
        double lowest = double.MaxValue;
        foreach (int v in part)
        {
            double along = _x[v] * axes.Ux + _y[v] * axes.Uy;
            if (along >= lowest)
                continue;
            lowest = along;
            start = v;
        }
        for (int pass = 0; pass < 2; pass++)
        {
            _stampNow++;
            foreach (int v in part)
            {
                _stamp[v] = _stampNow;
                _level[v] = -1;
            }
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
                if (_stamp[w] != _stampNow || _level[w] >= 0)
                    continue;
                _level[w] = _level[v] + 1;
                _queue[filled++] = w;
            }
        }
        return filled;
    }

    /// <summary>Separator size (in unknowns) of every cut of the sorted part, both one-sided choices; keeps the cheapest in <paramref name="best"/>.</summary>
    private void Sweep(int count, ref Cut best)
    {
        _stampNow++;
        long total = 0;
        for (int i = 0; i < count; i++)
        {
            int v = _sorted[i];
            _stamp[v] = _stampNow;
            _position[v] = i;
            total += _graph.Weight[v];
        }
        Array.Clear(_leftChange, 0, count + 1);
        Array.Clear(_rightChange, 0, count + 1);
        for (int i = 0; i < count; i++)
        {
            int v = _sorted[i], high = i, low = i, weight = _graph.Weight[v];
            for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            {
                int w = _graph.Neighbours[p];
                if (_stamp[w] != _stampNow)
                    continue;
                high = Math.Max(high, _position[w]);
                low = Math.Min(low, _position[w]);
            }
            _leftChange[i] += weight;
            _leftChange[high] -= weight;
            _rightChange[low] += weight;
            _rightChange[i] -= weight;
        }
        long before = 0, left = 0, right = 0;
        bool improved = false;
        for (int i = 0; i + 1 < count; i++)
        {
            left += _leftChange[i];
            right += _rightChange[i];
            before += _graph.Weight[_sorted[i]];
            double imbalance = Math.Abs(2.0 * before / total - 1);
            if (imbalance > 1 - 2 * SmallestShare && i + 1 != count / 2)
                continue;
            double cost = Math.Min(left, right) * (1 + imbalance * imbalance) + 1e-3 * imbalance;
            if (cost >= best.Cost)
                continue;
            best = new Cut(cost, i, left <= right);
            improved = true;
        }
        if (improved)
            (_best, _sorted) = (_sorted, _best);
    }

    private (int Left, int Right) Divide(Span<int> part, Cut cut)
    {
        int count = part.Length;
        _stampNow++;
        for (int i = 0; i < count; i++)
        {
            _stamp[_best[i]] = _stampNow;
            _position[_best[i]] = i;
        }
        int left = 0, right = 0, separator = 0;
        for (int i = 0; i < count; i++)
        {
            int v = _best[i];
            bool isLeft = i <= cut.Last;
            if (isLeft == cut.SeparatorIsLeft && TouchesOtherSide(v, cut.Last, isLeft))
                _queue[count - ++separator] = v;
            else if (isLeft)
                part[left++] = v;
            else
                _queue[right++] = v;
        }
        _queue.AsSpan(0, right).CopyTo(part[left..]);
        for (int i = 0; i < separator; i++)
            part[left + right + i] = _queue[count - 1 - i];
        return (left, right);
    }

    private bool TouchesOtherSide(int v, int last, bool isLeft)
    {
        for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
        {
            int w = _graph.Neighbours[p];
            if (_stamp[w] == _stampNow && _position[w] <= last != isLeft)
                return true;
        }
        return false;
    }

    /// <summary>A cut after the vertex at <paramref name="Last"/> of the sorted part.</summary>
    private readonly record struct Cut(double Cost, int Last, bool SeparatorIsLeft);

    /// <summary>Direction of the largest extent of a part, from its second moments.</summary>
    private readonly record struct Axes(double Ux, double Uy, bool IsSlender)
    {
        public static Axes Of(ReadOnlySpan<int> part, double[] x, double[] y)
        {
            double mx = 0, my = 0, a = 0, b = 0, c = 0;
            foreach (int v in part)
            {
                mx += x[v];
                my += y[v];
            }
            mx /= part.Length;
            my /= part.Length;
            foreach (int v in part)
            {
                double dx = x[v] - mx, dy = y[v] - my;
                a += dx * dx;
                b += dx * dy;
                c += dy * dy;
            }
            // Exact axes for parts that lie along x or y, so that rows of a mesh tie.
            if (Math.Abs(b) < 1e-6 * (a + c))
                return a >= c ? new Axes(1, 0, a > SlendernessForOneAxis * c) : new Axes(0, 1, c > SlendernessForOneAxis * a);
            double angle = 0.5 * Math.Atan2(2 * b, a - c), ux = Math.Cos(angle), uy = Math.Sin(angle);
            double major = a * ux * ux + 2 * b * ux * uy + c * uy * uy;
            return new Axes(ux, uy, major > SlendernessForOneAxis * (a + c - major));
        }
    }
}
