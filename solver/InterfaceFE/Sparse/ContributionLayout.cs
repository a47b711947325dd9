namespace InterfaceFE.Sparse;

/// <summary>
/// Where contribution blocks live. Those beside what can change are kept from one factorisation to the next, as are those that one thread makes and another one reads; the
/// others share places in a small arena, one arena for each thread.
/// </summary>
internal sealed class ContributionLayout
{
    /// <summary>Lays out the blocks of a plan whose fronts, children and branches are known.</summary>
    public ContributionLayout(SparsePlan plan)
    {
        bool[] isChangeable = ChangeableFronts(plan);
        int fronts = plan.FrontCount;
        IsKept = new bool[fronts];
        Place = new long[fronts];
        for (int s = 0; s < fronts; s++)
        {
            int parent = plan.Parent[s];
            IsKept[s] = parent >= 0 && (isChangeable[parent] || parent == fronts || plan.Branches.IsTop[parent]);
        }
        foreach ((int first, int end) in plan.Branches.Branches)
            PlaceBranch(plan, first, end);
        for (int s = 0; s < fronts; s++)
        {
            if (!IsKept[s])
                continue;
            Place[s] = KeptLength;
            KeptLength += Size(plan, s);
        }
    }

    /// <summary>Whether the block of a front is kept.</summary>
    public bool[] IsKept { get; }

    /// <summary>Start of each front's block, among the kept ones or in the arena.</summary>
    public long[] Place { get; }

    /// <summary>Length of all kept blocks.</summary>
    public long KeptLength { get; private set; }

    /// <summary>Length of an arena.</summary>
    public long ArenaLength { get; private set; }

    /// <summary>Length of a front's block.</summary>
    public static long Size(SparsePlan plan, int front) => (long)plan.PaddedRows(front) * plan.PaddedRows(front);

    /// <summary>Fronts that hold a changeable vertex, and their ancestors.</summary>
    private static bool[] ChangeableFronts(SparsePlan plan)
    {
        SlotPattern pattern = plan.Pattern;
        var result = new bool[plan.FrontCount + 1];
        for (int place = 0; place < plan.UnknownCount; place++)
            result[plan.FrontOf[place]] |= pattern.IsChangeable[pattern.VertexOfUnknown[plan.OldOf[place]]];
        for (int s = 0; s < plan.FrontCount; s++)
            if (result[s] && plan.Parent[s] >= 0)
                result[plan.Parent[s]] = true;
        return result;
    }

    private void PlaceBranch(SparsePlan plan, int first, int end)
    {
        var arena = new ArenaPlanner();
        for (int s = first; s < end; s++)
        {
            if (!IsKept[s] && plan.RowCount(s) > 0)
                Place[s] = arena.Take(Size(plan, s));
            for (int c = plan.ChildStart[s]; c < plan.ChildStart[s + 1]; c++)
                if (!IsKept[plan.Children[c]])
                    arena.Release(Place[plan.Children[c]], Size(plan, plan.Children[c]));
        }
        ArenaLength = Math.Max(ArenaLength, arena.Length);
    }
}
