using InterfaceFE.Sparse;

namespace InterfaceFE.Marching;

/// <summary>
/// Tangents of all elements and the factors that they need. A symmetric factor holds the symmetric parts: it serves solves while no tangent is skew, and the counts of unstable
/// directions always. Few skew unknowns are carried by a border of that factor, which also takes the control equation; for many a general factor along the same paths costs less.
/// </summary>
internal sealed class TangentFactor
{
    private const double SkewTolerance = 1e-12;

    /// <summary>
    /// Skew unknowns up to which the border carries them. A border of n rows costs n forward substitutions along the paths and n² products, a general factor twice the work of the
    /// symmetric one along them: they draw level at about three bundles of eight.
    /// </summary>
    private const int MostInBorder = 24;

    private readonly SparsePlan _plan;
    private readonly WorkingFactor _symmetric;
    private readonly BorderedFactor _bordered;
    private readonly double[][] _tangents;
    private readonly bool[] _isSkew;
    private readonly int[] _skewIndex;
    private readonly List<int> _skewUnknowns = [];
    private readonly double[] _symmetrised;
    private readonly double[] _borderRight = new double[MostInBorder + 1];
    private readonly double[] _borderSolution = new double[MostInBorder + 1];
    private readonly double[] _skewMatrix = new double[MostInBorder * MostInBorder];
    private GeneralFactor? _general;
    private double[] _tangentSolution = [];
    private bool _isSkewListed = true;

    /// <summary>Makes room; tangents are to be stored before anything is factored.</summary>
    public TangentFactor(SlotPattern pattern, int largestSlot)
    {
        _plan = SparsePlan.Analyze(pattern);
        _symmetric = new WorkingFactor(_plan);
        _bordered = new BorderedFactor(_symmetric);
        _tangents = new double[pattern.SlotCount][];
        _isSkew = new bool[pattern.SlotCount];
        _skewIndex = new int[pattern.UnknownCount];
        Array.Fill(_skewIndex, -1);
        _symmetrised = new double[largestSlot * largestSlot];
    }

    /// <summary>The plan of the factorisation.</summary>
    public SparsePlan Plan => _plan;

    /// <summary>Threads that a factorisation may use.</summary>
    public int Threads
    {
        get => _symmetric.Threads;
        set => _symmetric.Threads = value;
    }

    /// <summary>Outcome of the latest factorisation.</summary>
    public FactorOutcome Outcome { get; private set; }

    /// <summary>Number of factorisations so far.</summary>
    public long Factorisations { get; private set; }

    /// <summary>Floating-point operations of all factorisations so far, over those of one whole factorisation.</summary>
    public double WholeFactorisations { get; private set; }

    /// <summary>Number of tangents so far that differed from those stored before them.</summary>
    public long Changed { get; private set; }

    /// <summary>Whether a slot has a tangent.</summary>
    public bool Has(int slot) => _tangents[slot] is not null;

    /// <summary>Tangent of a slot, row-major.</summary>
    public ReadOnlySpan<double> Tangent(int slot) => _tangents[slot];

    /// <summary>Stores the tangent of a slot. Returns whether it differs from the one before.</summary>
    public bool Store(int slot, ReadOnlySpan<double> tangent)
    {
        double[]? stored = _tangents[slot];
        if (stored is not null && tangent.SequenceEqual(stored))
            return false;
        Changed += stored is null ? 0 : 1;
        stored ??= _tangents[slot] = new double[tangent.Length];
        tangent.CopyTo(stored);
        int n = _plan.Pattern.Unknowns(slot).Length;
        bool skew = IsSkew(stored, n);
        if (skew != _isSkew[slot])
        {
            _isSkew[slot] = skew;
            _isSkewListed = false;
        }
        _general?.Replace(slot, stored);
        if (!skew)
        {
            _symmetric.Replace(slot, stored);
            return true;
        }
        Span<double> symmetric = _symmetrised.AsSpan(0, n * n);
        for (int i = 0; i < n; i++)
            for (int j = 0; j < n; j++)
                symmetric[i * n + j] = 0.5 * (stored[i * n + j] + stored[j * n + i]);
        _symmetric.Replace(slot, symmetric);
        return true;
    }

    /// <summary>Factors what solves need.</summary>
    public void Factor()
    {
        ListSkew();
        if (_skewUnknowns.Count <= MostInBorder)
        {
            FactorSymmetric();
            return;
        }
        if (_general is null)
        {
            _general = new GeneralFactor(_plan) { Threads = Threads };
            for (int slot = 0; slot < _tangents.Length; slot++)
                if (_tangents[slot] is not null)
                    _general.Replace(slot, _tangents[slot]);
        }
        Take(_general);
    }

    /// <summary>Factors the symmetric parts.</summary>
    public void FactorSymmetric() => Take(_symmetric);

    /// <summary>Signs of the eigenvalues of the symmetric parts without the held unknowns.</summary>
    public Inertia Inertia(ReadOnlySpan<int> held) => _symmetric.Inertia(held);

    /// <summary>Estimate of the condition number of the symmetric parts without the held unknowns.</summary>
    public double Condition(ReadOnlySpan<int> held) => _symmetric.Condition(held);

    /// <summary>Solves with the symmetric parts.</summary>
    public void SolveSymmetric(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> held) => _symmetric.Solve(b, x, held);

    /// <summary>Product with the symmetric parts.</summary>
    public void MultiplySymmetric(ReadOnlySpan<double> x, Span<double> product) => _symmetric.Multiply(x, product);

    /// <summary>Solves K x = b; on entry x has the values of held unknowns.</summary>
    public void Solve(ReadOnlySpan<double> b, Span<double> x, ReadOnlySpan<int> held)
    {
        if (_skewUnknowns.Count == 0)
            _symmetric.Solve(b, x, held);
        else if (_skewUnknowns.Count > MostInBorder)
            _general!.Solve(b, x, held);
        else
        {
            BorderSkew();
            _bordered.Factor(held);
            SolveBordered(b, x, 0);
        }
    }

    /// <summary>
    /// Solves K x = b + f λ, gᵀ x + h λ = e, with held unknowns at the values in x plus their rates times λ. Returns λ. K may be singular where the whole is not.
    /// </summary>
    /// <param name="b">Right side.</param>
    /// <param name="rate">f.</param>
    /// <param name="gradient">g.</param>
    /// <param name="byProgress">h.</param>
    /// <param name="equation">e.</param>
    /// <param name="x">Solution; on entry with the values of held unknowns.</param>
    /// <param name="held">Held root unknowns.</param>
    /// <param name="heldRate">Rates of all unknowns; those of held ones are used.</param>
    public double SolveControlled(ReadOnlySpan<double> b, ReadOnlySpan<double> rate, ReadOnlySpan<double> gradient, double byProgress, double equation, Span<double> x, ReadOnlySpan<int> held, ReadOnlySpan<double> heldRate)
    {
        if (_skewUnknowns.Count > MostInBorder)
            return SolveControlledApart(b, rate, gradient, byProgress, equation, x, held, heldRate);
        BorderSkew();
        int control = _bordered.AddRow(byProgress);
        _bordered.AddToRow(control, _bordered.AddVector(gradient), 1);
        _bordered.AddToColumn(control, _bordered.AddVector(rate), -1);
        foreach (int unknown in held)
            if (heldRate[unknown] != 0)
                _bordered.AddHeldMove(control, unknown, heldRate[unknown]);
        _bordered.Factor(held);
        SolveBordered(b, x, equation);
        return _borderSolution[control];
    }

    /// <summary>The same by two solves with the general factor.</summary>
    private double SolveControlledApart(ReadOnlySpan<double> b, ReadOnlySpan<double> rate, ReadOnlySpan<double> gradient, double byProgress, double equation, Span<double> x, ReadOnlySpan<int> held, ReadOnlySpan<double> heldRate)
    {
        if (_tangentSolution.Length == 0)
            _tangentSolution = new double[x.Length];
        _general!.Solve(b, x, held);
        heldRate.CopyTo(_tangentSolution);
        _general.Solve(rate, _tangentSolution, held);
        double along = byProgress, rest = -equation;
        for (int i = 0; i < x.Length; i++)
        {
            along += gradient[i] * _tangentSolution[i];
            rest += gradient[i] * x[i];
        }
        double progress = -rest / along;
        for (int i = 0; i < x.Length; i++)
            x[i] += progress * _tangentSolution[i];
        return progress;
    }

    private void Take(MultifrontalFactor factor)
    {
        bool isDone = factor.IsUpToDate;
        Outcome = factor.Factor();
        if (isDone)
            return;
        Factorisations++;
        if (_plan.Flops > 0)
            WholeFactorisations += factor.LastFlops / _plan.Flops;
    }

    private void BorderSkew()
    {
        _bordered.Clear();
        int n = _skewUnknowns.Count;
        if (n == 0)
            return;
        Span<double> matrix = _skewMatrix.AsSpan(0, n * n);
        matrix.Clear();
        for (int slot = 0; slot < _tangents.Length; slot++)
        {
            if (!_isSkew[slot])
                continue;
            ReadOnlySpan<int> unknowns = _plan.Pattern.Unknowns(slot);
            double[] tangent = _tangents[slot];
            int m = unknowns.Length;
            for (int i = 0; i < m; i++)
                for (int j = 0; j < m; j++)
                    if (tangent[i * m + j] != tangent[j * m + i])
                        matrix[_skewIndex[unknowns[i]] * n + _skewIndex[unknowns[j]]] += 0.5 * (tangent[i * m + j] - tangent[j * m + i]);
        }
        _bordered.AddToMatrix(System.Runtime.InteropServices.CollectionsMarshal.AsSpan(_skewUnknowns), matrix);
    }

    /// <summary>Solves with a border whose last right side is the control's; those before it are zero.</summary>
    private void SolveBordered(ReadOnlySpan<double> b, Span<double> x, double equation)
    {
        Span<double> right = _borderRight.AsSpan(0, _bordered.Rows);
        right.Clear();
        if (_bordered.Rows > _skewUnknowns.Count)
            right[^1] = equation;
        _bordered.Solve(b, right, x, _borderSolution.AsSpan(0, _bordered.Rows));
    }

    private void ListSkew()
    {
        if (_isSkewListed)
            return;
        foreach (int unknown in _skewUnknowns)
            _skewIndex[unknown] = -1;
        _skewUnknowns.Clear();
        for (int slot = 0; slot < _tangents.Length; slot++)
        {
            if (!_isSkew[slot])
                continue;
            foreach (int unknown in _plan.Pattern.Unknowns(slot))
            {
                if (_skewIndex[unknown] >= 0)
                    continue;
                _skewIndex[unknown] = _skewUnknowns.Count;
                _skewUnknowns.Add(unknown);
            }
        }
        _isSkewListed = true;
    }

    private static bool IsSkew(double[] tangent, int n)
    {
        double scale = 0, difference = 0;
        for (int i = 0; i < n; i++)
            for (int j = 0; j < i; j++)
            {
                scale = Math.Max(scale, Math.Abs(tangent[i * n + j]));
                difference = Math.Max(difference, Math.Abs(tangent[i * n + j] - tangent[j * n + i]));
            }
        return difference > SkewTolerance * scale;
    }
}
