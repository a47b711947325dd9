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

    private readonly bool _isSymmetric;
    private readonly SlotValues _values;
    private readonly FrontFactor _fronts;
    private readonly DenseRoot?[] _roots = new DenseRoot?[CachedRoots];
    private readonly bool[] _isHeld;
    private readonly AlignedBuffer _x;
    private readonly Refinement _refinement;
    private int _nextRoot;
    private bool _isFactored;
    private bool _isStale;

    private protected MultifrontalFactor(SparsePlan plan, bool isSymmetric)
    {
        ArgumentNullException.ThrowIfNull(plan);
        Plan = plan;
        _isSymmetric = isSymmetric;
        _values = new SlotValues(plan, isSymmetric);
        _fronts = new FrontFactor(plan, _values, isSymmetric);
        _isHeld = new bool[plan.RootUnknownCount];
        _x = new AlignedBuffer(plan.UnknownCount);
        _refinement = new Refinement(plan, _values, SolveOnce);
    }

    /// <summary>The plan that this factor follows.</summary>
    public SparsePlan Plan { get; }

    /// <inheritdoc/>
    public int Size => Plan.UnknownCount;

    /// <summary>Refinement steps of the last solve.</summary>
    public int RefinementSteps { get; private set; }

    /// <summary>
    /// Largest componentwise backward error |b - K x| / (|K| |x| + |b|) that the last solve ended with; NaN where it was not refined, since then it was not measured.
    /// </summary>
    public double BackwardError { get; private set; } = double.NaN;

    /// <summary>Pivots of the last factorisation that were lifted, numerically zero ones included.</summary>
    public int LiftedPivots => _fronts.Judge.Zero + _fronts.Judge.Harmful;

    /// <summary>Largest sum of magnitudes that went into a pivot of the last factorisation, over the scale of its unknown; about 2 for a definite matrix.</summary>
    public double Growth => _fronts.Growth;

    private int Halves => _isSymmetric ? 1 : 2;

    private bool IsRefined => !_isSymmetric || LiftedPivots > 0 || Growth > RefinedGrowth;

    /// <inheritdoc/>
    /// <exception cref="ArgumentOutOfRangeException">No such slot.</exception>
    /// <exception cref="ArgumentException">The matrix has another size than the slot.</exception>
    public void Replace(int slot, ReadOnlySpan<double> elementMatrix)
    {
        _values.Replace(slot, elementMatrix);
        _isStale = true;
    }

    /// <summary>
    /// Factors the matrix with the numbers now in the slots. <see cref="FactorStatus.NotFinite"/> names the slot and the row of the entry, or no slot (-1) where finite
    /// entries overflowed at an unknown; solves are refused then. <see cref="FactorStatus.ZeroPivot"/> speaks of unknowns outside the root: whether the root is singular
    /// depends on what is held, see <see cref="Inertia"/>.
    /// </summary>
    public FactorOutcome Factor()
    {
        _isFactored = false;
        foreach (DenseRoot? root in _roots)
            root?.Invalidate();
        (int slot, int unknown) = _values.FirstFault();
        if (slot >= 0)
            return new FactorOutcome(FactorStatus.NotFinite, unknown, slot, double.NaN);
        _fronts.Run();
        PivotJudge judge = _fronts.Judge;
        int fault = judge.FirstNotFinite >= 0 ? judge.FirstNotFinite : FirstFaultyRoot();
        if (fault >= 0)
            return new FactorOutcome(FactorStatus.NotFinite, Plan.OldOf[fault], -1, double.NaN);
        _isFactored = true;
        _isStale = false;
        double smallest = Plan.InteriorUnknownCount > 0 ? judge.SmallestRatio : 1;
        return judge.FirstZero < 0
            ? new FactorOutcome(FactorStatus.Done, -1, -1, smallest)
            : new FactorOutcome(FactorStatus.ZeroPivot, Plan.OldOf[judge.FirstZero], -1, smallest);
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
        SolveWith(root, b, x);
        if (IsRefined && !_isStale)
            (RefinementSteps, BackwardError) = _refinement.Run(b, x, _isHeld);
    }

    /// <inheritdoc/>
    /// <exception cref="InvalidOperationException">There is no sound factor: none was made, or an entry was not finite.</exception>
    /// <exception cref="ArgumentException">A held unknown is not a root unknown.</exception>
    public Inertia Inertia(ReadOnlySpan<int> heldRootUnknowns)
    {
        Inertia root = RootFor(heldRootUnknowns).Inertia;
        PivotJudge judge = _fronts.Judge;
        return new Inertia(judge.Positive + root.Positive, judge.Negative + root.Negative, judge.Zero + root.Zero);
    }

    /// <inheritdoc/>
    /// <exception cref="ArgumentException">A length is wrong.</exception>
    public void Multiply(ReadOnlySpan<double> x, Span<double> product)
    {
        if (x.Length != Size || product.Length != Size)
            throw new ArgumentException($"x and product must have {Size} entries; they have {x.Length} and {product.Length}.");
        _values.Multiply(x, product);
    }

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

    private DenseRoot RootFor(ReadOnlySpan<int> held)
    {
        if (!_isFactored)
            throw new InvalidOperationException("There is no sound factor: call Factor first and look at its outcome.");
        Array.Clear(_isHeld);
        foreach (int unknown in held)
        {
            if ((uint)unknown >= (uint)Size || Plan.NewOf[unknown] < Plan.InteriorUnknownCount)
                throw new ArgumentException($"Unknown {unknown} is not a root unknown and cannot be held.", nameof(held));
            _isHeld[Plan.NewOf[unknown] - Plan.InteriorUnknownCount] = true;
        }
        foreach (DenseRoot? known in _roots)
            if (known is not null && known.Serves(_isHeld))
                return known;
        DenseRoot root = _roots[_nextRoot] ??= NewRoot(Plan.RootUnknownCount);
        _nextRoot = (_nextRoot + 1) % CachedRoots;
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
                SolveWith(root, b, x);
                return;
            }
    }

    private void SolveWith(DenseRoot root, ReadOnlySpan<double> b, Span<double> x)
    {
        int interior = Plan.InteriorUnknownCount;
        double* work = _x.Start;
        for (int i = 0; i < Size; i++)
            work[i] = b[Plan.OldOf[i]];
        _fronts.Forward(work);
        for (int i = 0; i < _isHeld.Length; i++)
            if (_isHeld[i])
                work[interior + i] = x[Plan.OldOf[interior + i]];
        root.Solve(_fronts, Halves, work + interior);
        _fronts.Backward(work);
        for (int i = 0; i < Size; i++)
            x[Plan.OldOf[i]] = work[i];
    }
}
