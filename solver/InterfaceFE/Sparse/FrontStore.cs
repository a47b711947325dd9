namespace InterfaceFE.Sparse;

/// <summary>
/// The numbers of a factor, front after front: panels (pivot columns, all rows), kept contribution blocks, pivots, and what was noted of the pivots. A general matrix is
/// K = L D U with unit triangles; its two halves, L and the transpose of U, are treated alike, and for a symmetric matrix they are one.
/// </summary>
internal sealed unsafe class FrontStore
{
    private readonly SparsePlan _plan;
    private readonly AlignedBuffer[] _panels;
    private readonly double*[][] _blocks;
    private readonly AlignedBuffer[] _kept;
    private readonly List<AlignedBuffer> _later = [];
    private readonly AlignedBuffer _diagonal;
    private readonly AlignedBuffer _inverse;
    private readonly AlignedBuffer _sizes;
    private readonly AlignedBuffer _rowSizes;

    /// <summary>Makes room for all numbers but the blocks that are not kept.</summary>
    public FrontStore(SparsePlan plan, bool isSymmetric)
    {
        _plan = plan;
        Halves = isSymmetric ? 1 : 2;
        _panels = new AlignedBuffer[Halves];
        _kept = new AlignedBuffer[Halves];
        _blocks = new double*[Halves][];
        ContributionLayout layout = plan.Contributions;
        for (int half = 0; half < Halves; half++)
        {
            // Kernels read, but do not write, up to seven columns behind a panel.
            _panels[half] = new AlignedBuffer(plan.PanelStart[^1] + (long)SparsePlan.Padding * plan.LongestPanel);
            _kept[half] = new AlignedBuffer(layout.KeptLength);
            _blocks[half] = new double*[plan.FrontCount];
            for (int front = 0; front < plan.FrontCount; front++)
                if (layout.IsKept[front])
                    _blocks[half][front] = _kept[half].Start + layout.Place[front];
        }
        _diagonal = new AlignedBuffer(plan.UnknownCount);
        _inverse = new AlignedBuffer(plan.UnknownCount + SparsePlan.Padding);
        _sizes = new AlignedBuffer(plan.UnknownCount);
        _rowSizes = new AlignedBuffer(plan.RowStart[^1]);
        Tallies = new PivotTally[plan.FrontCount];
        HasLooked = new bool[plan.FrontCount];
    }

    /// <summary>1 for a symmetric matrix, 2 for a general one.</summary>
    public int Halves { get; }

    /// <summary>Pivots, by place.</summary>
    public double* Diagonal => _diagonal.Start;

    /// <summary>Inverse pivots, by place.</summary>
    public double* Inverse => _inverse.Start;

    /// <summary>Sum of magnitudes that went into each pivot, by place.</summary>
    public double* Sizes => _sizes.Start;

    /// <summary>Sums of magnitudes that each front adds to the diagonals of its rows, front after front.</summary>
    public double* RowSizes => _rowSizes.Start;

    /// <summary>What was noted of the pivots in each front's subtree.</summary>
    public PivotTally[] Tallies { get; }

    /// <summary>Whether a pivot of a front was looked at closely: its treatment then depends on the scales of the front's rows too.</summary>
    public bool[] HasLooked { get; }

    /// <summary>Panel of a front, or the root's dense block.</summary>
    public double* Panel(int half, int front) => _panels[half].Start + _plan.PanelStart[front];

    /// <summary>Kept contribution block of a front, null where it is not kept.</summary>
    public double* Block(int half, int front) => _blocks[half][front];

    /// <summary>Whether the contribution block of a front outlives the factorisation.</summary>
    public bool IsKept(int front) => _blocks[0][front] != null;

    /// <summary>Keeps the contribution block of a front from now on; what can change has spread to its parent.</summary>
    public void Keep(int front)
    {
        for (int half = 0; half < Halves; half++)
        {
            var block = new AlignedBuffer(ContributionLayout.Size(_plan, front));
            _later.Add(block);
            _blocks[half][front] = block.Start;
        }
    }
}
