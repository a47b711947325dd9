namespace InterfaceFE.Sparse;

/// <summary>
/// Dense factor of the free part of the root's Schur complement, for one choice of held unknowns. Rows and columns are scaled by the square roots of the unknowns' scales, so
/// that translations and rotations can be compared. A pivot that is numerically zero is counted and its part of a solution is taken as zero: solutions stay finite.
/// </summary>
internal abstract class DenseRoot
{
    private readonly bool[] _isHeld;
    private readonly double[] _left;
    private readonly double[] _right;
    private FrontFactor? _fronts;

    /// <summary>Makes room for up to <paramref name="size"/> unknowns.</summary>
    protected DenseRoot(int size)
    {
        _isHeld = new bool[size];
        Free = new int[size];
        Matrix = new double[(long)size * size];
        Scaling = new double[size];
        _left = new double[size];
        _right = new double[size];
        Work = new double[size];
    }

    /// <summary>Whether the factor belongs to the present numbers.</summary>
    public bool IsValid { get; private set; }

    /// <summary>Signs of the eigenvalues, or of the pivots where the matrix is not symmetric.</summary>
    public Inertia Inertia { get; protected set; }

    /// <summary>Number of free unknowns.</summary>
    protected int Count { get; private set; }

    /// <summary>Root numbers of the free unknowns.</summary>
    protected int[] Free { get; }

    /// <summary>Row-major Count×Count block, scaled; factored in place.</summary>
    protected double[] Matrix { get; }

    /// <summary>Factor of each free unknown's row and column.</summary>
    protected double[] Scaling { get; }

    /// <summary>One number per free unknown.</summary>
    protected double[] Work { get; }

    /// <summary>Whether this factor is that of the given choice, with the present numbers.</summary>
    public bool Serves(ReadOnlySpan<bool> isHeld) => IsValid && isHeld.SequenceEqual(_isHeld);

    /// <summary>The numbers changed.</summary>
    public void Invalidate() => IsValid = false;

    /// <summary>Takes the free block and factors it.</summary>
    public unsafe void Factor(FrontFactor fronts, int firstPlace, ReadOnlySpan<bool> isHeld, int halves)
    {
        isHeld.CopyTo(_isHeld);
        _fronts = fronts;
        Count = 0;
        for (int i = 0; i < isHeld.Length; i++)
            if (!isHeld[i])
                Free[Count++] = i;
        for (int i = 0; i < Count; i++)
        {
            Scaling[i] = 1 / Math.Sqrt(fronts.Scale(firstPlace + Free[i]));
        }
        double* lower = fronts.Root(0), upper = fronts.Root(halves - 1);
        nint stride = fronts.RootStride;
        for (int i = 0; i < Count; i++)
            for (int j = 0; j <= i; j++)
            {
                double scaling = Scaling[i] * Scaling[j];
                nint at = Free[j] * stride + Free[i];
                Matrix[j * Count + i] = upper[at] * scaling;
                Matrix[i * Count + j] = lower[at] * scaling;
            }
        Decompose();
        IsValid = true;
    }

    /// <summary>Solves for the free unknowns. On entry held places of <paramref name="x"/> have their values and free ones the right side; on return all have the solution.</summary>
    public unsafe void Solve(FrontFactor fronts, int halves, double* x)
    {
        double* lower = fronts.Root(0), upper = fronts.Root(halves - 1);
        nint stride = fronts.RootStride;
        for (int i = 0; i < Count; i++)
        {
            int row = Free[i];
            double sum = x[row];
            for (int column = 0; column < _isHeld.Length; column++)
                if (_isHeld[column])
                    sum -= (row >= column ? lower[column * stride + row] : upper[row * stride + column]) * x[column];
            Work[i] = sum * Scaling[i];
        }
        Substitute();
        for (int i = 0; i < Count; i++)
            x[Free[i]] = Work[i] * Scaling[i];
    }

    /// <summary>Factors <see cref="Matrix"/> and sets <see cref="Inertia"/>.</summary>
    protected abstract void Decompose();

    /// <summary>Replaces the right side in <see cref="Work"/> by the solution, both scaled.</summary>
    protected abstract void Substitute();

    /// <summary>
    /// Whether a scaled pivot (for several candidates the largest) is numerically zero. The vectors whose energy it is, scaled, are asked for only when it is small: left and
    /// right ones by free unknown.
    /// </summary>
    protected bool IsZero(double pivot, int k)
    {
        if (Math.Abs(pivot) >= PivotJudge.SmallRootShare)
            return false;
        Array.Clear(_left);
        Array.Clear(_right);
        Probe(k, Work, left: true);
        for (int i = 0; i < Count; i++)
            _left[Free[i]] = Work[i] * Scaling[i];
        Probe(k, Work, left: false);
        for (int i = 0; i < Count; i++)
            _right[Free[i]] = Work[i] * Scaling[i];
        return Math.Abs(pivot) <= Math.Max(PivotJudge.ZeroShare, PivotJudge.NoiseFactor * _fronts!.Look.RootNoise(_left, _right));
    }

    /// <summary>Sets the vector by free unknown that pivot k belongs to: 1 at its place, 0 at later ones, in balance at earlier ones.</summary>
    protected abstract void Probe(int k, Span<double> vector, bool left);

    /// <summary>target -= factor · source, equal lengths.</summary>
    protected static void Subtract(Span<double> target, ReadOnlySpan<double> source, double factor)
    {
        int i = 0, width = System.Numerics.Vector<double>.Count;
        var factors = new System.Numerics.Vector<double>(factor);
        for (; i + width <= target.Length; i += width)
            (new System.Numerics.Vector<double>(target[i..]) - factors * new System.Numerics.Vector<double>(source[i..])).CopyTo(target[i..]);
        for (; i < target.Length; i++)
            target[i] -= factor * source[i];
    }

    /// <summary>Exchanges two numbers of an array.</summary>
    protected static void Swap<T>(Span<T> values, int a, int b) => (values[a], values[b]) = (values[b], values[a]);
}
