namespace InterfaceFE.Sparse;

/// <summary>
/// What the symmetric and the general factor share: slots, fronts, the root's cache, and solves with refinement. Apart from the first use of a new number of held choices
/// nothing is allocated after construction. Not safe for use by several threads; the plan is.
/// </summary>
public abstract unsafe class MultifrontalFactor : IWorkingFactor
{
    private const int CachedRoots = 4;

    // Growth from which solves are refined. Definite matrices stay at 2, whatever the contrast of stiffness.
    private const double RefinedGrowth = 1e2;

    private readonly SlotValues _values;
    private readonly FrontFactor _fronts;
    private readonly FrontSolver _solver;
    private readonly DenseRoot?[] _roots = new DenseRoot?[CachedRoots];
    private readonly bool[] _isHeld;
    private readonly AlignedBuffer _x;
    private readonly Refinement _refinement;
    private double[]? _whole;
    private LaneSolver? _laneSolver;
    private AlignedBuffer? _lanes;
    private int _nextRoot;
    private bool _isFactored;
    private bool _isStale;

    private protected MultifrontalFactor(SparsePlan plan, bool isSymmetric)
    {
        ArgumentNullException.ThrowIfNull(plan);
        Plan = plan;
        _values = new SlotValues(plan, isSymmetric);
        _fronts = new FrontFactor(plan, _values, isSymmetric);
        _solver = new FrontSolver(plan, _fronts.Store);
        _isHeld = new bool[plan.RootUnknownCount];
        _x = new AlignedBuffer(plan.UnknownCount);
        _refinement = new Refinement(new Unbordered(this));
    }

    /// <summary>The plan that this factor follows.</summary>
    public SparsePlan Plan { get; }

    /// <summary>Whether the factor is that of the numbers now in the slots.</summary>
    public bool IsUpToDate => _isFactored && _fronts.IsUpToDate;

    /// <inheritdoc/>
    public int Size => Plan.UnknownCount;

    /// <summary>Refinement steps of the last solve; of several right sides the most.</summary>
    public int RefinementSteps { get; private set; }

    /// <summary>
    /// Largest componentwise backward error |b - K x| / (|K| |x| + |b|) that the last solve ended with; NaN where it was not refined, since then it was not measured.
    /// </summary>
    public double BackwardError { get; private set; } = double.NaN;

    /// <summary>Pivots of the last factorisation that were lifted, numerically zero ones included.</summary>
    public int LiftedPivots => _fronts.Tally.Zero + _fronts.Tally.Harmful;

    /// <summary>Largest sum of magnitudes that went into a pivot of the last factorisation, over the scale of its unknown; about 2 for a definite matrix.</summary>
    public double Growth => _fronts.Tally.Growth;

    /// <summary>
    /// Threads that a factorisation may use, 1 or 2; 1 at first. The work is cut into the same parts for any number, so that the same numbers come out to the last bit. A small
    /// factorisation stays on the calling thread.
    /// </summary>
    /// <exception cref="ArgumentOutOfRangeException">Neither 1 nor 2.</exception>
    public int Threads
    {
        get => _fronts.MayShare ? 2 : 1;
        set
        {
            ArgumentOutOfRangeException.ThrowIfLessThan(value, 1);
            ArgumentOutOfRangeException.ThrowIfGreaterThan(value, 2);
            _fronts.MayShare = value == 2;
        }
    }

    /// <summary>Floating-point operations of the last <see cref="Factor"/>, root block not included (a multiply-add counts as two; a general factor does twice as many).</summary>
    public double LastFlops { get; private set; }

    /// <summary>Number of factorisations so far; tells whether what was derived from the factor is still true.</summary>
    internal long Generation { get; private set; }

    /// <summary>The fronts.</summary>
    internal FrontFactor Fronts => _fronts;

    /// <summary>Substitution through the fronts.</summary>
    internal FrontSolver Substitution => _solver;

    private int Halves => _fronts.Store.Halves;

    /// <summary>Whether solves are refined with the true matrix.</summary>
    internal bool IsRefined => Halves == 2 || LiftedPivots > 0 || Growth > RefinedGrowth;

    /// <inheritdoc/>
    /// <exception cref="ArgumentOutOfRangeException">No such slot.</exception>
    /// <exception cref="ArgumentException">The matrix has another size than the slot.</exception>
    public void Replace(int slot, ReadOnlySpan<double> elementMatrix)
    {
        if (!_values.Replace(slot, elementMatrix))
            return;
        _fronts.MarkSlot(slot);
        _isStale = true;
    }

    /// <summary>Makes the next <see cref="Factor"/> a whole one. It leaves the same numbers as one along the changed paths: a check, and a measure of what those save.</summary>
    public void ForgetFactor() => _fronts.MarkAll();

    /// <summary>
    /// Factors the matrix with the numbers now in the slots: at first all of it, later the fronts from the slots that were replaced up to the root. <see cref="FactorStatus.NotFinite"/>
    /// names the slot and the row of the entry, or no slot (-1) where finite entries overflowed at an unknown; solves are refused then. <see cref="FactorStatus.ZeroPivot"/>
    /// speaks of unknowns outside the root: whether the root is singular depends on what is held, see <see cref="Inertia"/>.
    /// </summary>
    public FactorOutcome Factor()
    {
        if (IsUpToDate)
        {
            LastFlops = 0;
            return Outcome();
        }
        _isFactored = false;
        foreach (DenseRoot? root in _roots)
            root?.Invalidate();
        (int slot, int unknown) = _values.FirstFault();
        if (slot >= 0)
            return new FactorOutcome(FactorStatus.NotFinite, unknown, slot, double.NaN);
        LastFlops = _fronts.Run();
        int fault = _fronts.FirstNotFinite >= 0 ? _fronts.FirstNotFinite : FirstFaultyRoot();
        if (fault >= 0)
        {
            _fronts.MarkAll();
            return new FactorOutcome(FactorStatus.NotFinite, Plan.OldOf[fault], -1, double.NaN);
        }
        _isFactored = true;
        _isStale = false;
        Generation++;
        return Outcome();
    }

    /// <summary>
    /// Solves K x = b for the unknowns that are not held; see <see cref="IWorkingFactor.Solve"/>. Solutions are refined with the true matrix where a pivot was lifted, where
    /// round-off grew, and always for a general matrix — unless a slot was replaced since <see cref="Factor"/>: then the matrix that was factored is gone.
    /// </summary>
    /// <exception cref="InvalidOperationException">There is no sound factor: none was made, or an entry was not finite.</exception>
    /// <exception cref="ArgumentException">A length is wrong, or a held unknown is not a root unknown.</exception>
    public void Solve(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> heldRootUnknowns)
    {
        if (b.Length != Size || x.Length != Size)
            throw new ArgumentException($"b and x must have {Size} entries; they have {b.Length} and {x.Length}.");
        DenseRoot root = RootFor(heldRootUnknowns);
        RefinementSteps = 0;
        BackwardError = double.NaN;
        SolveWith(root, b, x, Plan.Whole);
        if (IsRefined && !_isStale)
            (RefinementSteps, BackwardError) = _refinement.Run(b, x);
    }

    /// <summary>
    /// Solves as <see cref="Solve(ReadOnlySpan{double}, Span{double}, ReadOnlySpan{int})"/> does, for a right side that is zero outside a path and for the values on that path alone:
    /// the same values to the last bit. Where solves are refined it costs a whole solve, since the residual needs all values.
    /// </summary>
    /// <param name="b">Right side, length <see cref="Size"/>; entries outside the path must be zero.</param>
    /// <param name="x">On entry values of held root unknowns; on return values on the path. Others stay as they are.</param>
    /// <param name="heldRootUnknowns">Indices of root unknowns that are held.</param>
    /// <param name="wanted">The path, of this factor's plan.</param>
    /// <exception cref="InvalidOperationException">There is no sound factor.</exception>
    /// <exception cref="ArgumentException">A length is wrong, or a held unknown is not a root unknown.</exception>
    public void Solve(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> heldRootUnknowns, FrontPath wanted)
    {
        ArgumentNullException.ThrowIfNull(wanted);
        if (b.Length != Size || x.Length != Size)
            throw new ArgumentException($"b and x must have {Size} entries; they have {b.Length} and {x.Length}.");
        DenseRoot root = RootFor(heldRootUnknowns);
        if (IsRefined && !_isStale)
        {
            _whole ??= new double[Size];
            x.CopyTo(_whole);
            Solve(b, _whole, heldRootUnknowns);
            CopyPath(_whole, x, wanted);
            return;
        }
        RefinementSteps = 0;
        BackwardError = double.NaN;
        SolveWith(root, b, x, wanted);
    }

    /// <summary>
    /// Solves for several right sides, eight at a time, so that the factor is read once for eight of them; one after the other where solves are refined. Agrees with single solves
    /// to round-off.
    /// </summary>
    /// <param name="b">Right sides, one after the other, each of length <see cref="Size"/>.</param>
    /// <param name="x">Solutions likewise; on entry with the values of held root unknowns. With <paramref name="wanted"/>, values outside the path stay as they are.</param>
    /// <param name="heldRootUnknowns">Indices of root unknowns that are held.</param>
    /// <param name="wanted">Path outside which all right sides are zero and no values are wanted; null for everything.</param>
    /// <exception cref="InvalidOperationException">There is no sound factor.</exception>
    /// <exception cref="ArgumentException">A length is wrong, or a held unknown is not a root unknown.</exception>
    public void SolveMany(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> heldRootUnknowns, FrontPath? wanted = null)
    {
        if (b.Length != x.Length || (Size > 0 && b.Length % Size != 0))
            throw new ArgumentException($"b and x must have one length, a multiple of {Size}; they have {b.Length} and {x.Length}.");
        int count = Size > 0 ? b.Length / Size : 0;
        FrontPath path = wanted ?? Plan.Whole;
        DenseRoot root = RootFor(heldRootUnknowns);
        if (IsRefined && !_isStale)
        {
            (int steps, double error) = (0, double.NaN);
            for (int c = 0; c < count; c++)
            {
                Solve(b.Slice(c * Size, Size), x.Slice(c * Size, Size), heldRootUnknowns, path);
                (steps, error) = (Math.Max(steps, RefinementSteps), c == 0 ? BackwardError : Math.Max(error, BackwardError));
            }
            (RefinementSteps, BackwardError) = (steps, error);
            return;
        }
        (RefinementSteps, BackwardError) = (0, double.NaN);
        _laneSolver ??= new LaneSolver(Plan, _fronts.Store);
        _lanes ??= new AlignedBuffer((long)LaneSolver.Lanes * Size);
        for (int from = 0; from < count; from += LaneSolver.Lanes)
            SolveLanes(root, b[(from * Size)..], x[(from * Size)..], Math.Min(LaneSolver.Lanes, count - from), path);
    }

    /// <inheritdoc/>
    /// <exception cref="InvalidOperationException">There is no sound factor: none was made, or an entry was not finite.</exception>
    /// <exception cref="ArgumentException">A held unknown is not a root unknown.</exception>
    public Inertia Inertia(ReadOnlySpan<int> heldRootUnknowns)
    {
        Inertia root = RootFor(heldRootUnknowns).Inertia;
        PivotTally tally = _fronts.Tally;
        return new Inertia(tally.Positive + root.Positive, tally.Negative + root.Negative, tally.Zero + root.Zero);
    }

    /// <inheritdoc/>
    /// <exception cref="ArgumentException">A length is wrong.</exception>
    public void Multiply(ReadOnlySpan<double> x, Span<double> product)
    {
        if (x.Length != Size || product.Length != Size)
            throw new ArgumentException($"x and product must have {Size} entries; they have {x.Length} and {product.Length}.");
        _values.Multiply(x, product);
    }

    /// <summary>residual = b - K x and size = |b| + |K| |x|, entry by entry.</summary>
    internal void Residual(ReadOnlySpan<double> b, ReadOnlySpan<double> x, Span<double> residual, Span<double> size) => _values.Residual(b, x, residual, size);

    private protected abstract DenseRoot NewRoot(int size);

    private int FirstFaultyRoot()
    {
        int count = Plan.RootUnknownCount, stride = _fronts.RootStride;
        for (int half = 0; half < Halves; half++)
            for (int j = 0; j < count; j++)
                for (int i = j; i < count; i++)
                    if (!double.IsFinite(_fronts.Root(half)[(nint)j * stride + i]))
                        return Plan.InteriorUnknownCount + i;
        return -1;
    }

    /// <summary>Marks the held ones among the root unknowns, in the order of the dense block.</summary>
    /// <exception cref="InvalidOperationException">There is no sound factor.</exception>
    /// <exception cref="ArgumentException">A held unknown is not a root unknown.</exception>
    internal void MarkHeld(ReadOnlySpan<int> held, Span<bool> isHeld)
    {
        if (!_isFactored)
            throw new InvalidOperationException("There is no sound factor: call Factor first and look at its outcome.");
        isHeld.Clear();
        foreach (int unknown in held)
        {
            if ((uint)unknown >= (uint)Size || Plan.NewOf[unknown] < Plan.InteriorUnknownCount)
                throw new ArgumentException($"Unknown {unknown} is not a root unknown and cannot be held.", nameof(held));
            isHeld[Plan.NewOf[unknown] - Plan.InteriorUnknownCount] = true;
        }
    }

    private DenseRoot RootFor(ReadOnlySpan<int> held)
    {
        MarkHeld(held, _isHeld);
        foreach (DenseRoot? known in _roots)
            if (known is not null && known.Serves(_isHeld))
                return known;
        int at = Array.FindIndex(_roots, known => known is null || !known.IsValid);
        if (at < 0)
            (at, _nextRoot) = (_nextRoot, (_nextRoot + 1) % CachedRoots);
        DenseRoot root = _roots[at] ??= NewRoot(Plan.RootUnknownCount);
        root.Factor(_fronts, Plan.InteriorUnknownCount, _isHeld, Halves);
        return root;
    }

    /// <summary>Correction for a residual, held unknowns staying put.</summary>
    private void SolveOnce(ReadOnlySpan<double> b, Span<double> x)
    {
        x.Clear();
        foreach (DenseRoot? root in _roots)
            if (root is not null && root.Serves(_isHeld))
            {
                SolveWith(root, b, x, Plan.Whole);
                return;
            }
    }

    /// <summary>Solves along a path without refinement; held values come from x.</summary>
    private void SolveWith(DenseRoot root, ReadOnlySpan<double> b, Span<double> x, FrontPath path)
    {
        int interior = Plan.InteriorUnknownCount;
        double* work = _x.Start;
        foreach (int front in path.Fronts)
            Take(Plan.First[front], Plan.First[front + 1], b);
        Take(interior, Size, b);
        _solver.Forward(work, path);
        for (int i = 0; i < _isHeld.Length; i++)
            if (_isHeld[i])
                work[interior + i] = x[Plan.OldOf[interior + i]];
        root.Solve(_fronts, Halves, work + interior);
        _solver.Backward(work, path);
        foreach (int front in path.Fronts)
            Give(Plan.First[front], Plan.First[front + 1], x);
        Give(interior, Size, x);
    }

    private void Take(int first, int end, ReadOnlySpan<double> b)
    {
        for (int i = first; i < end; i++)
            _x.Start[i] = b[Plan.OldOf[i]];
    }

    private void Give(int first, int end, Span<double> x)
    {
        for (int i = first; i < end; i++)
            x[Plan.OldOf[i]] = _x.Start[i];
    }

    private void SolveLanes(DenseRoot root, ReadOnlySpan<double> b, Span<double> x, int count, FrontPath path)
    {
        int interior = Plan.InteriorUnknownCount;
        double* work = _lanes!.Start;
        foreach (int front in path.Fronts)
            TakeLanes(Plan.First[front], Plan.First[front + 1], b, count);
        TakeLanes(interior, Size, b, count);
        _laneSolver!.Forward(work, path.Fronts, 0);
        for (int lane = 0; lane < count; lane++)
        {
            for (int i = 0; i < _isHeld.Length; i++)
                _x.Start[interior + i] = _isHeld[i] ? x[lane * Size + Plan.OldOf[interior + i]] : work[(nint)LaneSolver.Lanes * (interior + i) + lane];
            root.Solve(_fronts, Halves, _x.Start + interior);
            for (int i = interior; i < Size; i++)
                work[(nint)LaneSolver.Lanes * i + lane] = _x.Start[i];
        }
        _laneSolver.Backward(work, path.Fronts);
        foreach (int front in path.Fronts)
            GiveLanes(Plan.First[front], Plan.First[front + 1], x, count);
        GiveLanes(interior, Size, x, count);
    }

    private void TakeLanes(int first, int end, ReadOnlySpan<double> b, int count)
    {
        for (int i = first; i < end; i++)
            for (int lane = 0; lane < LaneSolver.Lanes; lane++)
                _lanes!.Start[(nint)LaneSolver.Lanes * i + lane] = lane < count ? b[lane * Size + Plan.OldOf[i]] : 0;
    }

    private void GiveLanes(int first, int end, Span<double> x, int count)
    {
        for (int i = first; i < end; i++)
            for (int lane = 0; lane < count; lane++)
                x[lane * Size + Plan.OldOf[i]] = _lanes!.Start[(nint)LaneSolver.Lanes * i + lane];
    }

    private void CopyPath(ReadOnlySpan<double> from, Span<double> to, FrontPath path)
    {
        foreach (int front in path.Fronts)
            for (int i = Plan.First[front]; i < Plan.First[front + 1]; i++)
                to[Plan.OldOf[i]] = from[Plan.OldOf[i]];
        for (int i = Plan.InteriorUnknownCount; i < Size; i++)
            to[Plan.OldOf[i]] = from[Plan.OldOf[i]];
    }

    private FactorOutcome Outcome()
    {
        PivotTally tally = _fronts.Tally;
        double smallest = Plan.InteriorUnknownCount > 0 ? tally.SmallestRatio : 1;
        return tally.FirstZero < 0
            ? new FactorOutcome(FactorStatus.Done, -1, -1, smallest)
            : new FactorOutcome(FactorStatus.ZeroPivot, Plan.OldOf[tally.FirstZero], -1, smallest);
    }

    /// <summary>The matrix for the held choice of the present solve.</summary>
    private sealed class Unbordered(MultifrontalFactor factor) : IRefinable
    {
        public int Count => factor.Size;

        public void Residual(ReadOnlySpan<double> b, ReadOnlySpan<double> x, Span<double> residual, Span<double> size)
        {
            factor._values.Residual(b, x, residual, size);
            factor.Plan.ClearHeld(residual, factor._isHeld);
        }

        public void Multiply(ReadOnlySpan<double> x, Span<double> product)
        {
            factor._values.Multiply(x, product);
            factor.Plan.ClearHeld(product, factor._isHeld);
        }

        public void Correct(ReadOnlySpan<double> b, Span<double> x) => factor.SolveOnce(b, x);
    }
}
