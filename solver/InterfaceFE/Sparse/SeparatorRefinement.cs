namespace InterfaceFE.Sparse;

/// <summary>
/// Makes a vertex separator smaller by moving its vertices, one at a time, into a piece, whereby their neighbours in the other piece take their place (C. M. Fiduccia and
/// R. M. Mattheyses, Proc. 19th Design Automation Conf. (1982) 175, in the form for vertex separators of C. Ashcraft and J. W. H. Liu, SIAM J. Matrix Anal. Appl. 19 (1998)
/// 325). Moves that make it worse are tried too; the best state of a pass is kept, so a separator is never worse than before. Ties fall to the vertex that came first.
/// </summary>
internal sealed class SeparatorRefinement
{
    private const int LargestPasses = 8;
    private const int Patience = 12;
    private const int LargestMoves = 4096;

    private readonly VertexGraph _graph;
    private readonly int[] _load;
    private readonly Side[] _side;
    private readonly long[] _loads = new long[4];
    private readonly int[] _place;
    private readonly int[] _pullToLeft;
    private readonly int[] _pullToRight;
    private readonly int[] _movedInPass;
    private readonly List<int> _separator = [];
    private readonly List<(int Vertex, Side Before)> _journal = [];
    private long _separatorUnknowns;
    private long _total;
    private int _pass;

    /// <summary>Prepares for refinements on a graph.</summary>
    /// <param name="graph">The graph.</param>
    /// <param name="load">Load of each vertex; pieces are balanced by it.</param>
    /// <param name="side">Side of each vertex; read and changed by <see cref="Run"/>.</param>
    public SeparatorRefinement(VertexGraph graph, int[] load, Side[] side)
    {
        _graph = graph;
        _load = load;
        _side = side;
        _place = new int[graph.Count];
        _pullToLeft = new int[graph.Count];
        _pullToRight = new int[graph.Count];
        _movedInPass = new int[graph.Count];
    }

    private Separation Now => new(_loads[(int)Side.Left], _loads[(int)Side.Right], _separatorUnknowns, _total);

    /// <summary>Refines the division of a part that the sides describe.</summary>
    /// <param name="part">Vertices of the part; all others have side <see cref="Side.Outside"/>.</param>
    /// <returns>Sizes afterwards.</returns>
    public Separation Run(ReadOnlySpan<int> part)
    {
        Array.Clear(_loads);
        _separatorUnknowns = _total = 0;
        _separator.Clear();
        foreach (int v in part)
        {
            _loads[(int)_side[v]] += _load[v];
            if (_side[v] == Side.Separator)
                List(v);
        }
        foreach (long load in _loads)
            _total += load;
        double limit = Math.Max(Separation.LargestImbalance, Now.Imbalance);
        for (int pass = 0; pass < LargestPasses && Improve(limit); pass++)
        {
        }
        return Now;
    }

    /// <summary>One pass; says whether the separator is better now.</summary>
    private bool Improve(double limit)
    {
        _pass++;
        _journal.Clear();
        foreach (int v in _separator)
            SetPulls(v);
        double before = Now.Cost, best = before;
        int kept = 0, idle = 0;
        for (int moves = 0; moves < LargestMoves && idle < Patience; moves++, idle++)
        {
            (int vertex, Side target) = BestMove(limit);
            if (vertex < 0)
                break;
            Move(vertex, target);
            double cost = Now.Cost;
            if (cost >= best)
                continue;
            best = cost;
            kept = _journal.Count;
            idle = -1;
        }
        for (int i = _journal.Count - 1; i >= kept; i--)
            Put(_journal[i].Vertex, _journal[i].Before);
        return best < before;
    }

    private (int Vertex, Side Target) BestMove(double limit)
    {
        Separation now = Now;
        (int Vertex, Side Target) best = (-1, Side.Outside);
        double lowest = double.MaxValue;
        foreach (int v in _separator)
        {
            if (_movedInPass[v] == _pass)
                continue;
            long weight = _graph.Weight[v], left = _pullToLeft[v], right = _pullToRight[v];
            Consider(new Separation(now.Left + _load[v], now.Right - left, now.Separator - weight + left, now.Total), v, Side.Left);
            Consider(new Separation(now.Left - right, now.Right + _load[v], now.Separator - weight + right, now.Total), v, Side.Right);
        }
        return best;

        void Consider(in Separation next, int v, Side target)
        {
            double cost = next.Cost;
            if (cost >= lowest || (next.Imbalance > limit && next.Imbalance >= now.Imbalance))
                return;
            lowest = cost;
            best = (v, target);
        }
    }

    private void Move(int v, Side target)
    {
        Side other = target == Side.Left ? Side.Right : Side.Left;
        int[] pullToOther = target == Side.Left ? _pullToRight : _pullToLeft, pullToTarget = target == Side.Left ? _pullToLeft : _pullToRight;
        Record(v, target);
        _movedInPass[v] = _pass;
        ChangePulls(v, pullToOther, _graph.Weight[v]);
        for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
        {
            int u = _graph.Neighbours[p];
            if (_side[u] != other)
                continue;
            Record(u, Side.Separator);
            ChangePulls(u, pullToTarget, -_graph.Weight[u]);
            SetPulls(u);
        }
    }

    private void ChangePulls(int v, int[] pull, int change)
    {
        for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            if (_side[_graph.Neighbours[p]] == Side.Separator)
                pull[_graph.Neighbours[p]] += change;
    }

    /// <summary>Unknowns that a separator vertex would pull into the separator by moving to either side.</summary>
    private void SetPulls(int v)
    {
        int toLeft = 0, toRight = 0;
        for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
        {
            int w = _graph.Neighbours[p];
            if (_side[w] == Side.Right)
                toLeft += _graph.Weight[w];
            else if (_side[w] == Side.Left)
                toRight += _graph.Weight[w];
        }
        _pullToLeft[v] = toLeft;
        _pullToRight[v] = toRight;
    }

    private void Record(int v, Side side)
    {
        _journal.Add((v, _side[v]));
        Put(v, side);
    }

    private void Put(int v, Side side)
    {
        _loads[(int)_side[v]] -= _load[v];
        _loads[(int)side] += _load[v];
        if (_side[v] == Side.Separator)
            Unlist(v);
        _side[v] = side;
        if (side == Side.Separator)
            List(v);
    }

    private void List(int v)
    {
        _separatorUnknowns += _graph.Weight[v];
        _place[v] = _separator.Count;
        _separator.Add(v);
    }

    private void Unlist(int v)
    {
        _separatorUnknowns -= _graph.Weight[v];
        int last = _separator[^1];
        _separator[_place[v]] = last;
        _place[last] = _place[v];
        _separator.RemoveAt(_separator.Count - 1);
    }
}
