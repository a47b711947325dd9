namespace InterfaceFE.Sparse;

/// <summary>
/// Columns with (nearly) the same structure grouped into supernodes (J. W. H. Liu, E. G. Ng and B. W. Peyton, SIAM J. Matrix Anal. Appl. 14 (1993) 242). A child is merged
/// into its parent where a model of the cost says that this pays: one front instead of two, against explicit zeros and against work on paths that pass through the parent
/// alone.
/// </summary>
internal sealed class SupernodeTree
{
    // Whole factorisations per change of one element.
    private const double WholeShare = 0.02;

    // How often an element outside layers changes (a metal yields), compared with one of a layer.
    private const double ConstantShare = 1.0 / 16;

    private readonly EliminationTree _tree;
    private readonly VertexGraph _graph;
    private readonly int[] _widthUpTo;
    private readonly PlanOptions _options;

    /// <summary>Groups the columns of an elimination tree.</summary>
    public SupernodeTree(EliminationTree tree, VertexGraph graph, PlanOptions options)
    {
        _tree = tree;
        _graph = graph;
        _options = options;
        _widthUpTo = new int[tree.Order.Length + 1];
        for (int i = 0; i < tree.Order.Length; i++)
            _widthUpTo[i + 1] = _widthUpTo[i] + graph.Weight[tree.Order[i]];
        int[] first = FundamentalSupernodes();
        int[] owner = Merge(first);
        (Order, Start, Rows) = Renumber(first, owner);
    }

    /// <summary>Vertices in the final elimination order, root vertices last.</summary>
    public int[] Order { get; }

    /// <summary>First position of each supernode; one more entry than supernodes.</summary>
    public int[] Start { get; }

    /// <summary>Positions of the rows below each supernode's pivots, rising.</summary>
    public int[][] Rows { get; }

    private int[] FundamentalSupernodes()
    {
        var first = new List<int>();
        var children = new int[_tree.InteriorCount];
        foreach (int parent in _tree.Parent)
            if (parent >= 0)
                children[parent]++;
        for (int j = 0; j < _tree.InteriorCount; j++)
            if (j == 0 || children[j] != 1 || _tree.Parent[j - 1] != j || _tree.Rows[j - 1].Length != _tree.Rows[j].Length + 1)
                first.Add(j);
        first.Add(_tree.InteriorCount);
        return first.ToArray();
    }

    private int Width(int first, int end) => _widthUpTo[end] - _widthUpTo[first];

    private int RowWidth(int column)
    {
        int width = 0;
        foreach (int i in _tree.Rows[column])
            width += Width(i, i + 1);
        return width;
    }

    /// <summary>For each fundamental supernode the one that it ends up in.</summary>
    private int[] Merge(int[] first)
    {
        int count = first.Length - 1;
        var of = new int[_tree.InteriorCount];
        for (int s = 0; s < count; s++)
            of.AsSpan(first[s], first[s + 1] - first[s]).Fill(s);
        double[] use = Uses(first, of);
        var width = new double[count];
        var rows = new double[count];
        var owner = new int[count];
        var children = new List<int>[count];
        var pending = new Stack<int>();
        for (int s = 0; s < count; s++)
        {
            width[s] = Width(first[s], first[s + 1]);
            rows[s] = RowWidth(first[s + 1] - 1);
            owner[s] = s;
            var kept = new List<int>();
            foreach (int child in children[s] ?? [])
                pending.Push(child);
            while (pending.Count > 0)
            {
                int child = pending.Pop();
                double apart = use[child] * Cost(width[child], rows[child]) + use[s] * Cost(width[s], rows[s]);
                if (use[s] * Cost(width[child] + width[s], rows[s]) >= apart)
                {
                    kept.Add(child);
                    continue;
                }
                owner[child] = s;
                width[s] += width[child];
                foreach (int grandchild in children[child])
                    pending.Push(grandchild);
            }
            kept.Sort();
            children[s] = kept;
            int parent = _tree.Parent[first[s + 1] - 1];
            if (parent >= 0)
                (children[of[parent]] ??= []).Add(s);
        }
        for (int s = count - 1; s >= 0; s--)
            owner[s] = owner[owner[s]];
        return owner;
    }

    /// <summary>How often each supernode is factored: whenever all is, and when something changes in its subtree.</summary>
    private double[] Uses(int[] first, int[] of)
    {
        int count = first.Length - 1;
        var changes = new double[count];
        double total = 0;
        for (int s = 0; s < count; s++)
        {
            for (int j = first[s]; j < first[s + 1]; j++)
            {
                double share = _graph.IsChangeable[_tree.Order[j]] ? 1 : ConstantShare;
                changes[s] += share;
                total += share;
            }
            int parent = _tree.Parent[first[s + 1] - 1];
            if (parent >= 0)
                changes[of[parent]] += changes[s];
        }
        for (int s = 0; s < count; s++)
            changes[s] = WholeShare + changes[s] / total;
        return changes;
    }

    /// <summary>Cost of a front, as a number of multiply-adds: arithmetic, numbers moved, and what each front costs anyhow.</summary>
    private double Cost(double width, double rows)
    {
        double order = width + rows;
        return SumOfSquares(order) - SumOfSquares(rows) + _options.EntryCost * order * (order + 1) / 2 + _options.FrontCost;
    }

    private static double SumOfSquares(double n) => n * (n + 1) * (2 * n + 1) / 6;

    /// <summary>Numbers merged supernodes in postorder, each with all its columns together.</summary>
    private (int[] Order, int[] Start, int[][] Rows) Renumber(int[] first, int[] owner)
    {
        int fundamental = first.Length - 1, interior = _tree.InteriorCount;
        var of = new int[interior];
        for (int s = 0; s < fundamental; s++)
            of.AsSpan(first[s], first[s + 1] - first[s]).Fill(owner[s]);
        var members = new List<int>[fundamental];
        var children = new List<int>[fundamental];
        for (int s = 0; s < fundamental; s++)
            (members[owner[s]] ??= []).Add(s);
        var tops = new List<int>();
        for (int s = 0; s < fundamental; s++)
        {
            if (owner[s] != s)
                continue;
            int parent = _tree.Parent[first[s + 1] - 1];
            if (parent < 0)
                tops.Add(s);
            else
                (children[of[parent]] ??= []).Add(s);
        }
        int[] postorder = Postorder(children, tops);
        var newOf = new int[_tree.Order.Length];
        var order = new int[_tree.Order.Length];
        var start = new int[postorder.Length + 1];
        int filled = 0;
        for (int n = 0; n < postorder.Length; n++)
        {
            foreach (int member in members[postorder[n]])
                for (int j = first[member]; j < first[member + 1]; j++)
                {
                    newOf[j] = filled;
                    order[filled++] = _tree.Order[j];
                }
            start[n + 1] = filled;
        }
        for (int i = interior; i < order.Length; i++)
        {
            newOf[i] = i;
            order[i] = _tree.Order[i];
        }
        var rows = new int[postorder.Length][];
        for (int n = 0; n < postorder.Length; n++)
        {
            int[] old = _tree.Rows[first[postorder[n] + 1] - 1];
            rows[n] = new int[old.Length];
            for (int i = 0; i < old.Length; i++)
                rows[n][i] = newOf[old[i]];
            Array.Sort(rows[n]);
        }
        return (order, start, rows);
    }

    private static int[] Postorder(List<int>[] children, List<int> tops)
    {
        var result = new List<int>();
        var stack = new Stack<(int Node, int Next)>();
        foreach (int top in tops)
        {
            stack.Push((top, 0));
            while (stack.Count > 0)
            {
                (int node, int next) = stack.Pop();
                if (children[node] is { } list && next < list.Count)
                {
                    stack.Push((node, next + 1));
                    stack.Push((list[next], 0));
                    continue;
                }
                result.Add(node);
            }
        }
        return result.ToArray();
    }
}
