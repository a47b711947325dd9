namespace InterfaceFE.Sparse;

/// <summary>
/// The symbolic part of a factorisation: elimination order, fronts, and where each slot's numbers go. Made once for a pattern, immutable, and safe to share between
/// threads and between factors of matrices with that pattern. The same pattern gives the same plan.
/// </summary>
public sealed class SparsePlan
{
    internal const int Padding = 8;

    private SparsePlan(SlotPattern pattern, PlanOptions options)
    {
        Pattern = pattern;
        var graph = VertexGraph.FromPattern(pattern);
        int[] interior = NestedDissection.Order(graph, pattern, options);
        var order = new List<int>(interior);
        for (int v = 0; v < graph.Count; v++)
            if (pattern.IsRoot[v] && graph.Weight[v] > 0)
                order.Add(v);
        var tree = new SupernodeTree(new EliminationTree(graph, order.ToArray(), interior.Length), graph, options);
        FrontCount = tree.Start.Length - 1;
        (NewOf, OldOf, int[] firstOfPosition) = NumberUnknowns(tree.Order, graph, UnknownCount);
        InteriorUnknownCount = firstOfPosition[interior.Length];
        First = new int[FrontCount + 2];
        for (int s = 0; s <= FrontCount; s++)
            First[s] = firstOfPosition[tree.Start[s]];
        First[FrontCount + 1] = UnknownCount;
        (RowStart, Rows) = ExpandRows(tree, firstOfPosition);
        FrontOf = new int[UnknownCount];
        for (int s = 0; s <= FrontCount; s++)
            FrontOf.AsSpan(First[s], Columns(s)).Fill(s);
        Parent = new int[FrontCount + 1];
        Parent[FrontCount] = -1;
        for (int s = 0; s < FrontCount; s++)
            Parent[s] = RowCount(s) == 0 ? -1 : FrontOf[Rows[RowStart[s]]];
        (ChildStart, Children) = Group(Parent, FrontCount + 1);
        FirstDescendant = new int[FrontCount + 1];
        for (int s = 0; s <= FrontCount; s++)
            FirstDescendant[s] = ChildStart[s] == ChildStart[s + 1] ? s : FirstDescendant[Children[ChildStart[s]]];
        PanelStart = PlacePanels();
        Slots = new SlotMap(this);
        Runs = new RunMap(this);
        Work = new double[FrontCount];
        for (int s = 0; s < FrontCount; s++)
        {
            long columns = Columns(s), rows = RowCount(s);
            FactorNonZeros += columns * (columns + 1) / 2 + columns * rows;
            for (long i = 0; i < columns; i++)
                Work[s] += (double)(columns + rows - i) * (columns + rows - i);
            Flops += Work[s];
            LargestFront = Math.Max(LargestFront, (int)(columns + rows));
        }
        for (int s = 0; s <= FrontCount; s++)
            LongestPanel = Math.Max(LongestPanel, Stride(s));
        LastFronts = [.. Enumerable.Range(0, FrontCount).Where(s => Parent[s] < 0 || Parent[s] == FrontCount)];
        Branches = new BranchPartition(Work, Parent, FirstDescendant);
        Contributions = new ContributionLayout(this);
        Samples = new SubtreeSamples(this);
        Whole = new FrontPath([.. Enumerable.Range(0, FrontCount)], UnknownCount);
    }

    /// <summary>The pattern that was analysed.</summary>
    public SlotPattern Pattern { get; }

    /// <summary>Number of unknowns.</summary>
    public int UnknownCount => Pattern.UnknownCount;

    /// <summary>Number of unknowns outside the root.</summary>
    public int InteriorUnknownCount { get; }

    /// <summary>Number of unknowns in the root block.</summary>
    public int RootUnknownCount => UnknownCount - InteriorUnknownCount;

    /// <summary>Number of fronts outside the root.</summary>
    public int FrontCount { get; }

    /// <summary>Most unknowns in a front.</summary>
    public int LargestFront { get; }

    /// <summary>Entries of the triangular factor, diagonal included, explicit zeros of merged fronts included, root block not.</summary>
    public long FactorNonZeros { get; }

    /// <summary>Floating-point operations of one symmetric factorisation, root block not included (a multiply-add counts as two; the general factor does twice as many).</summary>
    public double Flops { get; }

    /// <summary>Unknowns of the root, in the order of the dense block.</summary>
    public ReadOnlySpan<int> RootUnknowns => OldOf.AsSpan(InteriorUnknownCount);

    /// <summary>Place of each unknown in the elimination order.</summary>
    internal int[] NewOf { get; }

    /// <summary>Unknown at each place of the elimination order.</summary>
    internal int[] OldOf { get; }

    /// <summary>First pivot of each front; entry FrontCount is the root's, one more closes it.</summary>
    internal int[] First { get; }

    /// <summary>Start of each front's rows in <see cref="Rows"/>.</summary>
    internal int[] RowStart { get; }

    /// <summary>Places of the rows below the pivots, front after front, rising.</summary>
    internal int[] Rows { get; }

    /// <summary>Front in which each place is eliminated; FrontCount for the root.</summary>
    internal int[] FrontOf { get; }

    /// <summary>Parent front; FrontCount for the root, -1 for none.</summary>
    internal int[] Parent { get; }

    /// <summary>Start of each front's children in <see cref="Children"/>.</summary>
    internal int[] ChildStart { get; }

    /// <summary>Children, front after front, rising.</summary>
    internal int[] Children { get; }

    /// <summary>First front of each front's subtree; the subtree is all from there to the front itself.</summary>
    internal int[] FirstDescendant { get; }

    /// <summary>Start of each front's panel; the root's dense block comes last, one more entry gives the length.</summary>
    internal long[] PanelStart { get; }

    /// <summary>Floating-point operations of each front.</summary>
    internal double[] Work { get; }

    /// <summary>Fronts without a parent but the root.</summary>
    internal int[] LastFronts { get; }

    /// <summary>Longest column of a panel.</summary>
    internal int LongestPanel { get; }

    /// <summary>Branches that can be factored side by side.</summary>
    internal BranchPartition Branches { get; }

    /// <summary>Where contribution blocks live.</summary>
    internal ContributionLayout Contributions { get; }

    /// <summary>Places that stand for large subtrees.</summary>
    internal SubtreeSamples Samples { get; }

    /// <summary>All fronts.</summary>
    internal FrontPath Whole { get; }

    /// <summary>Where the slots' numbers go.</summary>
    internal SlotMap Slots { get; }

    /// <summary>Where the children's contribution blocks go.</summary>
    internal RunMap Runs { get; }

    /// <summary>Analyses a pattern: checks it, orders it, and lays out the factor.</summary>
    /// <param name="pattern">The pattern; kept, and not to be changed afterwards.</param>
    /// <param name="options">Choices; the defaults suit strips and stiffened panels.</param>
    /// <exception cref="ArgumentException">The pattern contradicts itself; the message says where.</exception>
    public static SparsePlan Analyze(SlotPattern pattern, PlanOptions? options = null)
    {
        ArgumentNullException.ThrowIfNull(pattern);
        return new SparsePlan(pattern, options ?? new PlanOptions());
    }

    /// <summary>The fronts from some unknowns to the root.</summary>
    /// <param name="unknowns">Unknowns; root unknowns add nothing, since every path ends in the root.</param>
    /// <exception cref="ArgumentOutOfRangeException">No such unknown.</exception>
    public FrontPath PathOf(ReadOnlySpan<int> unknowns)
    {
        foreach (int unknown in unknowns)
        {
            ArgumentOutOfRangeException.ThrowIfNegative(unknown, nameof(unknowns));
            ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(unknown, UnknownCount, nameof(unknowns));
        }
        var isOn = new bool[FrontCount];
        MarkPath(unknowns, isOn);
        int[] fronts = [.. Enumerable.Range(0, FrontCount).Where(s => isOn[s])];
        return new FrontPath(fronts, RootUnknownCount + fronts.Sum(Columns));
    }

    /// <summary>Floating-point operations of one factorisation of the fronts on a path.</summary>
    public double FlopsOf(FrontPath path)
    {
        ArgumentNullException.ThrowIfNull(path);
        double sum = 0;
        foreach (int s in path.Fronts)
            sum += Work[s];
        return sum;
    }

    /// <summary>Marks the fronts from some unknowns to the root.</summary>
    internal void MarkPath(ReadOnlySpan<int> unknowns, Span<bool> isOn)
    {
        foreach (int unknown in unknowns)
            for (int s = FrontOf[NewOf[unknown]]; s >= 0 && s < FrontCount && !isOn[s]; s = Parent[s])
                isOn[s] = true;
    }

    /// <summary>Zeroes the entries of held root unknowns, which are told by their order in the dense block.</summary>
    internal void ClearHeld(Span<double> vector, ReadOnlySpan<bool> isHeld)
    {
        for (int i = 0; i < isHeld.Length; i++)
            if (isHeld[i])
                vector[OldOf[InteriorUnknownCount + i]] = 0;
    }

    /// <summary>Number of pivots of a front.</summary>
    internal int Columns(int front) => First[front + 1] - First[front];

    /// <summary>Number of rows below the pivots.</summary>
    internal int RowCount(int front) => RowStart[front + 1] - RowStart[front];

    /// <summary>Pivots rounded up to the padding: local number of the first row below the pivots.</summary>
    internal int PaddedColumns(int front) => Pad(Columns(front));

    /// <summary>Length of a column of the panel.</summary>
    internal int Stride(int front) => PaddedColumns(front) + PaddedRows(front);

    /// <summary>Rows rounded up to the padding; column length of the contribution block.</summary>
    internal int PaddedRows(int front) => Pad(RowCount(front));

    internal static int Pad(int count) => (count + Padding - 1) / Padding * Padding;

    /// <summary>Sets the local number of each unknown of a front at its place in <paramref name="local"/>.</summary>
    internal void SetLocal(int front, int[] local)
    {
        int first = First[front], padded = PaddedColumns(front);
        for (int j = first; j < First[front + 1]; j++)
            local[j] = j - first;
        for (int i = RowStart[front]; i < RowStart[front + 1]; i++)
            local[Rows[i]] = padded + i - RowStart[front];
    }

    /// <summary>Lists the members of each group, rising; members with a negative group are left out.</summary>
    internal static (int[] Start, int[] Members) Group(int[] groupOf, int groups)
    {
        var start = new int[groups + 1];
        foreach (int g in groupOf)
            if (g >= 0)
                start[g + 1]++;
        for (int g = 0; g < groups; g++)
            start[g + 1] += start[g];
        var members = new int[start[groups]];
        int[] fill = start.AsSpan(0, groups).ToArray();
        for (int i = 0; i < groupOf.Length; i++)
            if (groupOf[i] >= 0)
                members[fill[groupOf[i]]++] = i;
        return (start, members);
    }

    private static (int[] NewOf, int[] OldOf, int[] FirstOfPosition) NumberUnknowns(int[] order, VertexGraph graph, int count)
    {
        var newOf = new int[count];
        var oldOf = new int[count];
        var first = new int[order.Length + 1];
        int filled = 0;
        for (int i = 0; i < order.Length; i++)
        {
            first[i] = filled;
            for (int k = 0; k < graph.Weight[order[i]]; k++, filled++)
            {
                oldOf[filled] = graph.FirstUnknown[order[i]] + k;
                newOf[oldOf[filled]] = filled;
            }
        }
        first[order.Length] = filled;
        return (newOf, oldOf, first);
    }

    private static (int[] Start, int[] Rows) ExpandRows(SupernodeTree tree, int[] firstOfPosition)
    {
        int fronts = tree.Rows.Length;
        var start = new int[fronts + 2];
        for (int s = 0; s < fronts; s++)
        {
            start[s + 1] = start[s];
            foreach (int i in tree.Rows[s])
                start[s + 1] = checked(start[s + 1] + firstOfPosition[i + 1] - firstOfPosition[i]);
        }
        start[fronts + 1] = start[fronts];
        var rows = new int[start[fronts]];
        int filled = 0;
        foreach (int[] positions in tree.Rows)
            foreach (int i in positions)
                for (int k = firstOfPosition[i]; k < firstOfPosition[i + 1]; k++)
                    rows[filled++] = k;
        return (start, rows);
    }

    private long[] PlacePanels()
    {
        var panel = new long[FrontCount + 2];
        for (int s = 0; s <= FrontCount; s++)
            panel[s + 1] = panel[s] + (long)Stride(s) * Columns(s);
        return panel;
    }
}
