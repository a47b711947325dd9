namespace InterfaceFE.Sparse;

/// <summary>
/// Elimination tree and column structures on vertices (J. W. H. Liu, SIAM J. Matrix Anal. Appl. 11 (1990) 134). Vertices are numbered by position in the elimination order;
/// positions from <see cref="InteriorCount"/> on are root vertices, which have no columns here.
/// </summary>
internal sealed class EliminationTree
{
    /// <summary>Builds the tree and relabels the order so that children precede parents without gap.</summary>
    /// <param name="graph">Graph of the vertices.</param>
    /// <param name="order">Interior vertices in elimination order, then root vertices; rearranged in place into postorder.</param>
    /// <param name="interiorCount">How many come before the root.</param>
    public EliminationTree(VertexGraph graph, int[] order, int interiorCount)
    {
        InteriorCount = interiorCount;
        Order = order;
        var position = new int[graph.Count];
        int[] parent = Parents(graph, order, position, interiorCount);
        int[] postorder = Postorder(parent, interiorCount);
        var newOf = new int[interiorCount];
        var relabelled = new int[interiorCount];
        for (int i = 0; i < interiorCount; i++)
        {
            newOf[postorder[i]] = i;
            relabelled[i] = order[postorder[i]];
        }
        relabelled.CopyTo(order, 0);
        Rows = Structures(graph, order, position, interiorCount);
        Parent = new int[interiorCount];
        for (int j = 0; j < interiorCount; j++)
            Parent[j] = Rows[j].Length > 0 && Rows[j][0] < interiorCount ? Rows[j][0] : -1;
    }

    /// <summary>Number of columns.</summary>
    public int InteriorCount { get; }

    /// <summary>Vertex at each position.</summary>
    public int[] Order { get; }

    /// <summary>Parent of each column; -1 where the next row is a root vertex or there is none.</summary>
    public int[] Parent { get; }

    /// <summary>Positions below the diagonal in each column of the factor, rising.</summary>
    public int[][] Rows { get; }

    private static void SetPositions(int[] order, int[] position)
    {
        Array.Fill(position, -1);
        for (int i = 0; i < order.Length; i++)
            position[order[i]] = i;
    }

    private static int[] Parents(VertexGraph graph, int[] order, int[] position, int interiorCount)
    {
        SetPositions(order, position);
        var parent = new int[interiorCount];
        var ancestor = new int[interiorCount];
        Array.Fill(parent, -1);
        Array.Fill(ancestor, -1);
        for (int j = 0; j < interiorCount; j++)
        {
            int v = order[j];
            for (int p = graph.Start[v]; p < graph.Start[v + 1]; p++)
            {
                int i = position[graph.Neighbours[p]];
                while (i != -1 && i < j)
                {
                    int next = ancestor[i];
                    ancestor[i] = j;
                    if (next == -1)
                    {
                        parent[i] = j;
                        break;
                    }
                    i = next;
                }
            }
        }
        return parent;
    }

    private static int[] Postorder(int[] parent, int count)
    {
        var firstChild = new int[count];
        var nextSibling = new int[count];
        Array.Fill(firstChild, -1);
        for (int j = count - 1; j >= 0; j--)
        {
            if (parent[j] < 0)
                continue;
            nextSibling[j] = firstChild[parent[j]];
            firstChild[parent[j]] = j;
        }
        var result = new int[count];
        var stack = new Stack<int>();
        int filled = 0;
        for (int top = 0; top < count; top++)
        {
            if (parent[top] >= 0)
                continue;
            stack.Push(top);
            while (stack.Count > 0)
            {
                int j = stack.Peek(), child = firstChild[j];
                if (child < 0)
                {
                    result[filled++] = j;
                    stack.Pop();
                    continue;
                }
                firstChild[j] = nextSibling[child];
                stack.Push(child);
            }
        }
        return result;
    }

    /// <summary>Structure of each column: its own entries and its children's, without the column itself.</summary>
    private static int[][] Structures(VertexGraph graph, int[] order, int[] position, int interiorCount)
    {
        SetPositions(order, position);
        var rows = new int[interiorCount][];
        var firstChild = new int[interiorCount];
        var nextSibling = new int[interiorCount];
        Array.Fill(firstChild, -1);
        var seen = new int[order.Length];
        var found = new List<int>();
        for (int j = 0; j < interiorCount; j++)
        {
            found.Clear();
            seen[j] = j + 1;
            int v = order[j];
            for (int p = graph.Start[v]; p < graph.Start[v + 1]; p++)
                Note(position[graph.Neighbours[p]], j);
            for (int child = firstChild[j]; child >= 0; child = nextSibling[child])
                foreach (int i in rows[child])
                    Note(i, j);
            int[] column = found.ToArray();
            Array.Sort(column);
            rows[j] = column;
            if (column.Length == 0 || column[0] >= interiorCount)
                continue;
            nextSibling[j] = firstChild[column[0]];
            firstChild[column[0]] = j;
        }
        return rows;

        void Note(int i, int j)
        {
            if (i <= j || seen[i] == j + 1)
                return;
            seen[i] = j + 1;
            found.Add(i);
        }
    }
}
