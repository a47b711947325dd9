namespace InterfaceFE.Sparse;

/// <summary>
/// Cuts the tree of fronts into branches, which can be factored side by side, and the fronts above them, which follow one after the other. The cut depends on the plan alone,
/// so the same numbers come from any number of threads.
/// </summary>
internal sealed class BranchPartition
{
    // Work of a front beside its arithmetic, in operations: zeroing and moving numbers (measured: half of the time of a front of 16 pivots).
    private const double FrontOverhead = 5000;
    private const int BranchesWanted = 16;

    /// <summary>Cuts the tree.</summary>
    /// <param name="work">Floating-point operations of each front.</param>
    /// <param name="parent">Parent of each front; the number of fronts stands for the root, -1 for none.</param>
    /// <param name="firstDescendant">First front of each subtree.</param>
    public BranchPartition(double[] work, int[] parent, int[] firstDescendant)
    {
        int fronts = work.Length;
        var subtree = new double[fronts];
        double total = 0;
        for (int s = 0; s < fronts; s++)
        {
            subtree[s] += work[s] + FrontOverhead;
            total += work[s] + FrontOverhead;
            if (parent[s] >= 0 && parent[s] < fronts)
                subtree[parent[s]] += subtree[s];
        }
        IsTop = new bool[fronts];
        var tops = new List<int>();
        var roots = new List<int>();
        for (int s = fronts - 1; s >= 0; s--)
        {
            bool isUnderTop = parent[s] < 0 || parent[s] == fronts || IsTop[parent[s]];
            if (!isUnderTop)
                continue;
            IsTop[s] = subtree[s] > total / BranchesWanted;
            (IsTop[s] ? tops : roots).Add(s);
        }
        tops.Reverse();
        Tops = tops.ToArray();
        // Long ones first, so that threads end together.
        roots.Sort((a, b) => subtree[a] != subtree[b] ? subtree[b].CompareTo(subtree[a]) : a.CompareTo(b));
        Branches = roots.ConvertAll(root => (firstDescendant[root], root + 1)).ToArray();
    }

    /// <summary>First front and end of each branch; a branch is a whole subtree and its fronts are numbered without gap.</summary>
    public (int First, int End)[] Branches { get; }

    /// <summary>Fronts above the branches, rising.</summary>
    public int[] Tops { get; }

    /// <summary>Whether a front is above the branches.</summary>
    public bool[] IsTop { get; }
}
