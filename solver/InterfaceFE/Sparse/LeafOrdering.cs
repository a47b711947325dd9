using System.Numerics;

namespace InterfaceFE.Sparse;

/// <summary>
/// Minimum degree on a small part with exact degrees kept in bit rows. Neighbours outside the part count towards the degree, since they are eliminated later.
/// Vertices whose matrices change go last, so that a change spoils little of the part's factor.
/// </summary>
internal sealed class LeafOrdering
{
    private const int LatePenalty = 1 << 24;

    private readonly VertexGraph _graph;
    private readonly bool[] _isLate;
    private readonly int[] _local;
    private readonly List<int> _members = [];
    private ulong[] _bits = [];
    private int[] _degree = [];
    private bool[] _done = [];

    public LeafOrdering(VertexGraph graph, bool[] isLate)
    {
        _graph = graph;
        _isLate = isLate;
        _local = new int[graph.Count];
        Array.Fill(_local, -1);
    }

    /// <summary>Rearranges the part into its elimination order.</summary>
    public void Order(Span<int> part)
    {
        int count = part.Length;
        if (count < 2)
            return;
        Number(part);
        int words = (_members.Count + 63) >> 6;
        Connect(count, words);
        for (int step = 0; step < count; step++)
        {
            int pivot = Cheapest(count);
            _done[pivot] = true;
            part[step] = _members[pivot];
            Eliminate(pivot, count, words);
        }
        foreach (int v in _members)
            _local[v] = -1;
    }

    private void Number(ReadOnlySpan<int> part)
    {
        _members.Clear();
        foreach (int v in part)
        {
            _local[v] = _members.Count;
            _members.Add(v);
        }
        foreach (int v in part)
            for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            {
                int w = _graph.Neighbours[p];
                if (_local[w] >= 0)
                    continue;
                _local[w] = _members.Count;
                _members.Add(w);
            }
    }

    private void Connect(int count, int words)
    {
        if (_bits.Length < count * words)
            _bits = new ulong[count * words];
        else
            Array.Clear(_bits, 0, count * words);
        if (_degree.Length < count)
        {
            _degree = new int[count];
            _done = new bool[count];
        }
        for (int i = 0; i < count; i++)
        {
            int v = _members[i];
            for (int p = _graph.Start[v]; p < _graph.Start[v + 1]; p++)
            {
                int j = _local[_graph.Neighbours[p]];
                _bits[i * words + (j >> 6)] |= 1ul << (j & 63);
            }
            _done[i] = false;
            _degree[i] = Degree(i, words);
        }
    }

    private int Cheapest(int count)
    {
        int best = -1, lowest = int.MaxValue;
        for (int i = 0; i < count; i++)
        {
            if (_done[i])
                continue;
            int degree = _degree[i] + (_isLate[_members[i]] ? LatePenalty : 0);
            if (degree >= lowest)
                continue;
            lowest = degree;
            best = i;
        }
        return best;
    }

    /// <summary>Joins the neighbours of the pivot to one another. Rows of vertices outside the part are not kept: none of them is eliminated here.</summary>
    private void Eliminate(int pivot, int count, int words)
    {
        Span<ulong> pivotRow = _bits.AsSpan(pivot * words, words);
        for (int word = 0; word < words; word++)
            for (ulong bits = pivotRow[word]; bits != 0; bits &= bits - 1)
            {
                int j = (word << 6) + BitOperations.TrailingZeroCount(bits);
                if (j >= count)
                    return;
                if (_done[j])
                    continue;
                Span<ulong> row = _bits.AsSpan(j * words, words);
                for (int q = 0; q < words; q++)
                    row[q] |= pivotRow[q];
                row[j >> 6] &= ~(1ul << (j & 63));
                row[pivot >> 6] &= ~(1ul << (pivot & 63));
                _degree[j] = Degree(j, words);
            }
    }

    /// <summary>Unknowns of the neighbours, those not yet eliminated.</summary>
    private int Degree(int i, int words)
    {
        int degree = 0;
        for (int word = 0; word < words; word++)
            for (ulong bits = _bits[i * words + word]; bits != 0; bits &= bits - 1)
                degree += _graph.Weight[_members[(word << 6) + BitOperations.TrailingZeroCount(bits)]];
        return degree;
    }
}
