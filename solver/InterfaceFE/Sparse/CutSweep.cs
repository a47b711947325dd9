namespace InterfaceFE.Sparse;

/// <summary>
/// Finds the best cut of a sorted part. Left of a cut are the vertices that come first; the separator of a cut are those vertices of one piece that touch the other, whichever
/// is fewer. One pass over the edges gives the separator's size for every cut.
/// </summary>
internal sealed class CutSweep
{
    private readonly VertexGraph _graph;
    private readonly int[] _load;
    private readonly Side[] _side;
    private readonly int[] _position;
    private readonly int[] _leftChange;
    private readonly int[] _rightChange;

    /// <summary>Prepares for parts of a graph.</summary>
    /// <param name="graph">The graph.</param>
    /// <param name="load">Load of each vertex; pieces are balanced by it.</param>
    /// <param name="side">Side of each vertex; read and changed by <see cref="Run"/>.</param>
    /// <param name="interior">Most vertices of a part.</param>
    public CutSweep(VertexGraph graph, int[] load, Side[] side, int interior)
    {
        _graph = graph;
        _load = load;
        _side = side;
        _position = new int[graph.Count];
        _leftChange = new int[interior + 1];
        _rightChange = new int[interior + 1];
    }

    /// <summary>Sets the sides of the part's vertices to the cheapest division by a cut of the sorted part.</summary>
    /// <param name="sorted">The part; no vertex of it has side <see cref="Side.Outside"/>, all others have.</param>
    /// <returns>Its cost.</returns>
    public double Run(ReadOnlySpan<int> sorted)
    {
        (int last, Side from, double cost) = Cheapest(sorted, Measure(sorted));
        Side to = from == Side.Left ? Side.Right : Side.Left;
        for (int i = 0; i < sorted.Length; i++)
            _side[sorted[i]] = i <= last ? Side.Left : Side.Right;
        foreach (int v in sorted)
            if (_side[v] == from && Touches(v, to))
                _side[v] = Side.Separator;
        return cost;
    }

    /// <summary>Notes the changes of both separators from one cut to the next; returns the load of the part.</summary>
    private long Measure(ReadOnlySpan<int> sorted)
    {
        int count = sorted.Length;
        for (int i = 0; i < count; i++)
            _position[sorted[i]] = i;
        Array.Clear(_leftChange, 0, count + 1);
        Array.Clear(_rightChange, 0, count + 1);
        long total = 0;
        for (int i = 0; i < count; i++)
        {
            int v = sorted[i], high = i, low = i, weight = _graph.Weight[v];
            for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            {
                int w = _graph.Neighbours[p];
                if (_side[w] == Side.Outside)
                    continue;
                high = Math.Max(high, _position[w]);
                low = Math.Min(low, _position[w]);
            }
            _leftChange[i] += weight;
            _leftChange[high] -= weight;
            _rightChange[low] += weight;
            _rightChange[i] -= weight;
            total += _load[v];
        }
        return total;
    }

    private (int Last, Side From, double Cost) Cheapest(ReadOnlySpan<int> sorted, long total)
    {
        long before = 0, left = 0, right = 0;
        (int Last, Side From, double Cost) best = (0, Side.Left, double.MaxValue);
        for (int i = 0; i + 1 < sorted.Length; i++)
        {
            left += _leftChange[i];
            right += _rightChange[i];
            before += _load[sorted[i]];
            if (Math.Abs(2.0 * before / total - 1) > Separation.LargestImbalance && i + 1 != sorted.Length / 2)
                continue;
            double fromLeft = new Separation(before, total - before, left, total).Cost, fromRight = new Separation(before, total - before, right, total).Cost;
            if (Math.Min(fromLeft, fromRight) >= best.Cost)
                continue;
            best = (i, fromLeft <= fromRight ? Side.Left : Side.Right, Math.Min(fromLeft, fromRight));
        }
        return best;
    }

    private bool Touches(int v, Side side)
    {
        for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            if (_side[_graph.Neighbours[p]] == side)
                return true;
        return false;
    }
}
