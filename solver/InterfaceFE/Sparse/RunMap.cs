namespace InterfaceFE.Sparse;

/// <summary>Where the rows of each front's contribution block go in its parent: runs of neighbouring rows that stay neighbours.</summary>
internal sealed class RunMap
{
    /// <summary>Builds the map of a plan whose fronts are laid out.</summary>
    public RunMap(SparsePlan plan)
    {
        var source = new List<int>();
        var target = new List<int>();
        var length = new List<int>();
        var begin = new int[plan.FrontCount + 1];
        var end = new int[plan.FrontCount + 1];
        var local = new int[plan.UnknownCount];
        for (int front = 0; front <= plan.FrontCount; front++)
        {
            plan.SetLocal(front, local);
            int padded = plan.PaddedColumns(front);
            for (int c = plan.ChildStart[front]; c < plan.ChildStart[front + 1]; c++)
            {
                int child = plan.Children[c], first = plan.RowStart[child], rows = plan.RowCount(child);
                begin[child] = source.Count;
                for (int i = 0; i < rows;)
                {
                    int start = local[plan.Rows[first + i]], run = 1;
                    while (i + run < rows && local[plan.Rows[first + i + run]] == start + run && start + run != padded)
                        run++;
                    source.Add(i);
                    target.Add(start);
                    length.Add(run);
                    i += run;
                }
                end[child] = source.Count;
            }
        }
        (Begin, End, Source, Target, Length) = (begin, end, source.ToArray(), target.ToArray(), length.ToArray());
    }

    /// <summary>First run of each front.</summary>
    public int[] Begin { get; }

    /// <summary>End of each front's runs.</summary>
    public int[] End { get; }

    /// <summary>First row of each run in the child's contribution block.</summary>
    public int[] Source { get; }

    /// <summary>Local number of that row in the parent.</summary>
    public int[] Target { get; }

    /// <summary>Number of rows of each run.</summary>
    public int[] Length { get; }
}
