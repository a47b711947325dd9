namespace InterfaceFE.Sparse;

/// <summary>
/// Dense factor of the free part of the root's Schur complement, for one choice of held unknowns, with the rows of a border below it where there is one. Rows and columns are
/// scaled by the square roots of the unknowns' scales, so that translations and rotations can be compared. A pivot that is numerically zero is counted and its part of a
/// solution is taken as zero: solutions stay finite.
/// </summary>
internal abstract class DenseRoot
{
    private readonly bool[] _isHeld;
    private readonly double[] _left;
    private readonly double[] _right;
    private FrontFactor? _fronts;
    private BorderBlock? _border;
    private int _freeCount;

    /// <summary>Makes room for <paramref name="size"/> unknowns and <paramref name="borderRows"/> rows of a border.</summary>
    protected DenseRoot(int size, int borderRows)
    {
        int all = size + borderRows;
        _isHeld = new bool[size];
        Free = new int[size];
        Matrix = new double[(long)all * all];
        RowScaling = new double[all];
        ColumnScaling = new double[all];
        _left = new double[size];
        _right = new double[size];
        Work = new double[all];
    }

    /// <summary>Whether the factor belongs to the present numbers.</summary>
    public bool IsValid { get; private set; }

    /// <summary>Signs of the eigenvalues, or of the pivots where the matrix is not symmetric.</summary>
    public Inertia Inertia { get; protected set; }

    /// <summary>Number of rows: free unknowns, then the border's.</summary>
    protected int Count { get; private set; }

    /// <summary>Root numbers of the free unknowns.</summary>
    protected int[] Free { get; }

    /// <summary>Row-major Count×Count block, scaled; factored in place.</summary>
    protected double[] Matrix { get; }

    /// <summary>Factor of each row.</summary>
    protected double[] RowScaling { get; }

    /// <summary>Factor of each column; that of the row but for an unsymmetric border.</summary>
    protected double[] ColumnScaling { get; }

    /// <summary>One number per row.</summary>
    protected double[] Work { get; }

    /// <summary>Whether this factor is that of the given choice, with the present numbers.</summary>
    public bool Serves(ReadOnlySpan<bool> isHeld) => IsValid && isHeld.SequenceEqual(_isHeld);

    /// <summary>The numbers changed.</summary>
    public void Invalidate() => IsValid = false;

    /// <summary>Takes the free block and the border, and factors them.</summary>
    public unsafe void Factor(FrontFactor fronts, int firstPlace, ReadOnlySpan<bool> isHeld, int halves, BorderBlock? border = null)
    {
        isHeld.CopyTo(_isHeld);
        _fronts = fronts;
        _border = border;
        _freeCount = 0;
        for (int i = 0; i < isHeld.Length; i++)
            if (!isHeld[i])
                Free[_freeCount++] = i;
        Count = _freeCount + (border?.Count ?? 0);
        for (int i = 0; i < _freeCount; i++)
            RowScaling[i] = ColumnScaling[i] = 1 / Math.Sqrt(fronts.Scale(firstPlace + Free[i]));
        double* lower = fronts.Root(0), upper = fronts.Root(halves - 1);
        nint stride = fronts.RootStride;
        for (int i = 0; i < _freeCount; i++)
            for (int j = 0; j <= i; j++)
            {
                // One factor after the other: of the smallest numbers the factors' product would overflow.
                nint at = Free[j] * stride + Free[i];
                Matrix[j * Count + i] = upper[at] * RowScaling[i] * ColumnScaling[j];
                Matrix[i * Count + j] = lower[at] * RowScaling[i] * ColumnScaling[j];
            }
        if (border is not null)
            TakeBorder(border);
        Decompose();
        IsValid = true;
    }

    /// <summary>Solves for the free unknowns. On entry held places of <paramref name="x"/> have their values and free ones the right side; on return all have the solution.</summary>
    /// <param name="fronts">The fronts that were factored.</param>
    /// <param name="halves">1 for a symmetric matrix, 2 for a general one.</param>
    /// <param name="x">Root unknowns.</param>
    /// <param name="y">Unknowns of the border: right side on entry, solution on return; empty without border.</param>
    public unsafe void Solve(FrontFactor fronts, int halves, double* x, Span<double> y = default)
    {
        double* lower = fronts.Root(0), upper = fronts.Root(halves - 1);
        nint stride = fronts.RootStride;
        for (int i = 0; i < _freeCount; i++)
        {
            int row = Free[i];
            double sum = x[row];
            for (int column = 0; column < _isHeld.Length; column++)
                if (_isHeld[column])
                    sum -= (row >= column ? lower[column * stride + row] : upper[row * stride + column]) * x[column];
            Work[i] = sum * RowScaling[i];
        }
        for (int i = 0; i < y.Length; i++)
        {
            double sum = y[i];
            for (int column = 0; column < _isHeld.Length; column++)
                if (_isHeld[column])
                    sum -= _border!.Row(i, column) * x[column];
            Work[_freeCount + i] = sum * RowScaling[_freeCount + i];
        }
        Substitute();
        for (int i = 0; i < _freeCount; i++)
            x[Free[i]] = Work[i] * ColumnScaling[i];
        for (int i = 0; i < y.Length; i++)
            y[i] = Work[_freeCount + i] * ColumnScaling[_freeCount + i];
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
        double ofBorder = 0;
        Probe(k, Work, left: true);
        for (int i = 0; i < _freeCount; i++)
            _left[Free[i]] = Work[i] * RowScaling[i];
        for (int i = _freeCount; i < Count; i++)
            ofBorder = Math.Max(ofBorder, Math.Abs(Work[i]));
        Probe(k, Work, left: false);
        for (int i = 0; i < _freeCount; i++)
            _right[Free[i]] = Work[i] * ColumnScaling[i];
        for (int i = _freeCount; i < Count; i++)
            ofBorder = Math.Max(ofBorder, Math.Abs(Work[i]));
        // Rows of the border are scaled to unity.
        double noise = _fronts!.Look.RootNoise(_left, _right) + PivotJudge.RoundOff * ofBorder * ofBorder;
        return Math.Abs(pivot) <= Math.Max(PivotJudge.ZeroShare, PivotJudge.NoiseFactor * noise);
    }

    private void TakeBorder(BorderBlock border)
    {
        for (int i = 0; i < border.Count; i++)
        {
            double row = Math.Sqrt(border.Size(i)), column = row;
            for (int j = 0; j < _freeCount; j++)
            {
                row = Math.Max(row, Math.Abs(border.Row(i, Free[j])) * ColumnScaling[j]);
                column = Math.Max(column, Math.Abs(border.Column(i, Free[j])) * RowScaling[j]);
            }
            if (border.IsSymmetric)
                row = column = Math.Max(row, column);
            RowScaling[_freeCount + i] = row > 0 ? 1 / row : 1;
            ColumnScaling[_freeCount + i] = column > 0 ? 1 / column : 1;
        }
        for (int i = 0; i < border.Count; i++)
        {
            int at = _freeCount + i;
            for (int j = 0; j < _freeCount; j++)
            {
                Matrix[at * Count + j] = border.Row(i, Free[j]) * RowScaling[at] * ColumnScaling[j];
                Matrix[j * Count + at] = border.Column(i, Free[j]) * RowScaling[j] * ColumnScaling[at];
            }
            for (int j = 0; j < border.Count; j++)
                Matrix[at * Count + _freeCount + j] = border.Corner(i, j) * RowScaling[at] * ColumnScaling[_freeCount + j];
        }
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
