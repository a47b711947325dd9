namespace InterfaceFE.Sparse;

/// <summary>
/// A symmetric factor with a border of further rows and columns:
/// <code>
/// K x + B y = b,   Cᵀ x + E y = g.
/// </code>
/// The border is eliminated last, together with the free root unknowns, in one dense pivoted block (Bunch and Kaufman where it is symmetric, else by rows), so that K itself may
/// be singular where the whole is not: at a limit point, under constraints. It takes control equations, contact and multipliers, and the skew part of tangents:
/// K + P A Pᵀ is the border with B = P A, C = P, E = -1. Rows and columns are sums of common sparse vectors, each carried through the factor once. A column may also move
/// held root unknowns. Meant for up to some two hundred rows.
/// </summary>
public sealed unsafe class BorderedFactor
{
    private readonly WorkingFactor _factor;
    private readonly SparsePlan _plan;
    private readonly FrontFactor _fronts;
    private readonly BorderVectors _vectors;
    private readonly BorderBlock _block;
    private readonly bool[] _isHeld;
    private readonly AlignedBuffer _x;
    private readonly List<Share> _rowShares = [];
    private readonly List<Share> _columnShares = [];
    private readonly List<Share> _heldMoves = [];
    private double[] _corner = [];
    private double[] _shares = [];
    private readonly Refinement _refinement;
    private double[] _right = [];
    private double[] _solution = [];
    private DenseRoot? _symmetricRoot;
    private DenseRoot? _generalRoot;
    private DenseRoot? _root;
    private int _capacity;
    private long _generation;

    /// <summary>An empty border of a factor.</summary>
    public BorderedFactor(WorkingFactor factor)
    {
        ArgumentNullException.ThrowIfNull(factor);
        _factor = factor;
        _plan = factor.Plan;
        _fronts = factor.Fronts;
        _vectors = new BorderVectors(_plan, _fronts.Store);
        _block = new BorderBlock(_plan.RootUnknownCount);
        _isHeld = new bool[_plan.RootUnknownCount];
        _x = new AlignedBuffer(_plan.UnknownCount);
        _refinement = new Refinement(new Whole(this));
    }

    /// <summary>Number of rows of the border.</summary>
    public int Rows { get; private set; }

    /// <summary>Signs of the eigenvalues of the whole where the border is symmetric; else of the pivots, whose product has the sign of the determinant.</summary>
    public Inertia Inertia { get; private set; }

    /// <summary>Largest componentwise backward error of the last solve; NaN where it was not refined, since then it was not measured.</summary>
    public double BackwardError { get; private set; } = double.NaN;

    /// <summary>Takes all rows and vectors away.</summary>
    public void Clear()
    {
        Rows = 0;
        _root = null;
        _vectors.Clear();
        _rowShares.Clear();
        _columnShares.Clear();
        _heldMoves.Clear();
    }

    /// <summary>Adds a sparse vector over the unknowns; returns its number.</summary>
    public int AddVector(ReadOnlySpan<int> unknowns, ReadOnlySpan<double> values)
    {
        if (unknowns.Length != values.Length)
            throw new ArgumentException($"{unknowns.Length} unknowns have {values.Length} values.", nameof(values));
        foreach (int unknown in unknowns)
            if ((uint)unknown >= (uint)_plan.UnknownCount)
                throw new ArgumentOutOfRangeException(nameof(unknowns), unknown, $"There are {_plan.UnknownCount} unknowns.");
        return _vectors.Add(unknowns, values);
    }

    /// <summary>Adds a vector with a value for each unknown, zeros left out; returns its number.</summary>
    public int AddVector(ReadOnlySpan<double> values)
    {
        if (values.Length != _plan.UnknownCount)
            throw new ArgumentException($"{values.Length} values for {_plan.UnknownCount} unknowns.", nameof(values));
        return _vectors.Add(values);
    }

    /// <summary>Adds a row and a column of zeros with the given corner; returns its number.</summary>
    public int AddRow(double corner)
    {
        int rows = Rows + 1;
        if (_corner.Length < rows * rows)
            Array.Resize(ref _corner, 4 * rows * rows);
        // Corners are kept row by row with the present number of rows: move the old ones apart, last row first.
        for (int i = Rows - 1; i >= 0; i--)
        {
            for (int j = Rows - 1; j >= 0; j--)
                _corner[i * rows + j] = _corner[i * Rows + j];
            _corner[i * rows + Rows] = 0;
        }
        _corner.AsSpan(Rows * rows, rows).Clear();
        _corner[rows * rows - 1] = corner;
        return Rows++;
    }

    /// <summary>Adds a share of a vector to row <paramref name="row"/> (C).</summary>
    public void AddToRow(int row, int vector, double share) => _rowShares.Add(new Share(row, vector, share));

    /// <summary>Adds a share of a vector to column <paramref name="column"/> (B).</summary>
    public void AddToColumn(int column, int vector, double share) => _columnShares.Add(new Share(column, vector, share));

    /// <summary>Adds a row whose column is its transpose: a constraint with its multiplier, or a contact.</summary>
    public int AddSymmetricRow(ReadOnlySpan<int> unknowns, ReadOnlySpan<double> values, double corner)
    {
        int vector = AddVector(unknowns, values), row = AddRow(corner);
        AddToRow(row, vector, 1);
        AddToColumn(row, vector, 1);
        return row;
    }

    /// <summary>Adds P A Pᵀ to the matrix, P picking some unknowns; A need not be symmetric.</summary>
    /// <param name="unknowns">The unknowns.</param>
    /// <param name="matrix">A, row-major.</param>
    public void AddToMatrix(ReadOnlySpan<int> unknowns, ReadOnlySpan<double> matrix)
    {
        int n = unknowns.Length, firstVector = _vectors.Count, firstRow = Rows;
        ReadOnlySpan<double> one = [1];
        for (int i = 0; i < n; i++)
        {
            AddVector(unknowns.Slice(i, 1), one);
            AddToRow(AddRow(-1), firstVector + i, 1);
        }
        for (int j = 0; j < n; j++)
            for (int i = 0; i < n; i++)
                if (matrix[i * n + j] != 0)
                    AddToColumn(firstRow + j, firstVector + i, matrix[i * n + j]);
    }

    /// <summary>The value of border unknown <paramref name="column"/> moves a held root unknown by this rate.</summary>
    public void AddHeldMove(int column, int rootUnknown, double rate) => _heldMoves.Add(new Share(column, _plan.NewOf[rootUnknown] - _plan.InteriorUnknownCount, rate));

    /// <summary>Entry of the corner E.</summary>
    public ref double Corner(int row, int column) => ref _corner[row * Rows + column];

    /// <summary>Eliminates the border with the factor's present numbers.</summary>
    /// <param name="heldRootUnknowns">Root unknowns that are held.</param>
    /// <exception cref="InvalidOperationException">The factor is not sound.</exception>
    public void Factor(ReadOnlySpan<int> heldRootUnknowns)
    {
        _factor.MarkHeld(heldRootUnknowns, _isHeld);
        _generation = _factor.Generation;
        _vectors.Forward();
        bool isSymmetric = IsSymmetric();
        FillBlock(isSymmetric);
        _root = RootFor(isSymmetric);
        _root.Factor(_fronts, _plan.InteriorUnknownCount, _isHeld, 1, _block);
        PivotTally tally = _fronts.Tally;
        Inertia own = _root.Inertia;
        Inertia = new Inertia(tally.Positive + own.Positive, tally.Negative + own.Negative, tally.Zero + own.Zero);
    }

    /// <summary>Solves for both; refined with the true matrix where the factor's own solves are.</summary>
    /// <param name="b">Right side of the unknowns; entries of held ones are ignored.</param>
    /// <param name="g">Right side of the border.</param>
    /// <param name="x">On entry values of held root unknowns, to which held moves are added; on return all values.</param>
    /// <param name="y">Values of the border's unknowns.</param>
    /// <exception cref="InvalidOperationException"><see cref="Factor"/> was not called since the border or its factor changed.</exception>
    public void Solve(ReadOnlySpan<double> b, ReadOnlySpan<double> g, Span<double> x, Span<double> y)
    {
        if (_root is null || _generation != _factor.Generation)
            throw new InvalidOperationException("The border has not been factored since it or its factor changed: call Factor first.");
        SolveOnce(b, g, x, y);
        BackwardError = double.NaN;
        if (!_factor.IsRefined)
            return;
        int n = _plan.UnknownCount, all = n + Rows;
        if (_right.Length < all)
        {
            _right = new double[all + Rows];
            _solution = new double[all + Rows];
        }
        b.CopyTo(_right);
        g.CopyTo(_right.AsSpan(n));
        x.CopyTo(_solution);
        y.CopyTo(_solution.AsSpan(n));
        (_, BackwardError) = _refinement.Run(_right.AsSpan(0, all), _solution.AsSpan(0, all));
        _solution.AsSpan(0, n).CopyTo(x);
        _solution.AsSpan(n, Rows).CopyTo(y);
    }

    private DenseRoot RootFor(bool isSymmetric)
    {
        if (Rows > _capacity)
        {
            _capacity = 2 * Rows;
            _symmetricRoot = _generalRoot = null;
        }
        return isSymmetric
            ? _symmetricRoot ??= new SymmetricRoot(_plan.RootUnknownCount, _capacity)
            : _generalRoot ??= new GeneralRoot(_plan.RootUnknownCount, _capacity);
    }

    private bool IsSymmetric()
    {
        if (_heldMoves.Count > 0 || _rowShares.Count != _columnShares.Count)
            return false;
        for (int i = 0; i < _rowShares.Count; i++)
            if (_rowShares[i] != _columnShares[i])
                return false;
        for (int i = 0; i < Rows; i++)
            for (int j = 0; j < i; j++)
                if (_corner[i * Rows + j] != _corner[j * Rows + i])
                    return false;
        return true;
    }

    private void FillBlock(bool isSymmetric)
    {
        _block.Reset(Rows, isSymmetric);
        int roots = _plan.RootUnknownCount;
        foreach (Share share in _rowShares)
            for (int i = 0; i < roots; i++)
                _block.Row(share.Row, i) += share.Value * _vectors.AtRoot(share.Of, i);
        foreach (Share share in _columnShares)
            for (int i = 0; i < roots; i++)
                _block.Column(share.Row, i) += share.Value * _vectors.AtRoot(share.Of, i);
        for (int i = 0; i < Rows; i++)
            for (int j = 0; j < Rows; j++)
                _block.Corner(i, j) = _corner[i * Rows + j];
        for (int i = 0; i < Rows; i++)
            _block.Size(i) = Math.Abs(_corner[i * Rows + i]);
        foreach (Share row in _rowShares)
            foreach (Share column in _columnShares)
            {
                double product = row.Value * column.Value * _vectors.Product(row.Of, column.Of);
                _block.Corner(row.Row, column.Row) -= product;
                if (row.Row == column.Row)
                    _block.Size(row.Row) += Math.Abs(product);
            }
        double* lower = _fronts.Root(0);
        nint stride = _fronts.RootStride;
        foreach (Share move in _heldMoves)
        {
            for (int i = 0; i < roots; i++)
                _block.Column(move.Row, i) += (i >= move.Of ? lower[move.Of * stride + i] : lower[i * stride + move.Of]) * move.Value;
            for (int i = 0; i < Rows; i++)
                _block.Corner(i, move.Row) += _block.Row(i, move.Of) * move.Value;
        }
    }

    private void SolveOnce(ReadOnlySpan<double> b, ReadOnlySpan<double> g, Span<double> x, Span<double> y)
    {
        int interior = _plan.InteriorUnknownCount, size = _plan.UnknownCount;
        double* work = _x.Start;
        if (_shares.Length < _vectors.Count)
            _shares = new double[2 * _vectors.Count];
        for (int i = 0; i < size; i++)
            work[i] = b[_plan.OldOf[i]];
        _factor.Substitution.Forward(work, _plan.Whole);
        _vectors.Dot(work, _shares);
        g.CopyTo(y);
        foreach (Share share in _rowShares)
            y[share.Row] -= share.Value * _shares[share.Of];
        for (int i = 0; i < _isHeld.Length; i++)
            if (_isHeld[i])
                work[interior + i] = x[_plan.OldOf[interior + i]];
        _root!.Solve(_fronts, 1, work + interior, y[..Rows]);
        foreach (Share move in _heldMoves)
            work[interior + move.Of] += move.Value * y[move.Row];
        Array.Clear(_shares);
        foreach (Share share in _columnShares)
            _shares[share.Of] += share.Value * y[share.Row];
        _vectors.Subtract(work, _shares);
        _factor.Substitution.Backward(work, _plan.Whole);
        for (int i = 0; i < size; i++)
            x[_plan.OldOf[i]] = work[i];
    }

    /// <summary>Adds the border's products to those of the matrix; with their magnitudes where room for them is given.</summary>
    /// <param name="x">Unknowns, then those of the border.</param>
    /// <param name="product">Products by row, the border's rows last; added to, times <paramref name="sign"/>.</param>
    /// <param name="size">Magnitudes, added to; empty where they are not wanted.</param>
    /// <param name="sign">1 or -1.</param>
    private void AddBorder(ReadOnlySpan<double> x, Span<double> product, Span<double> size, double sign)
    {
        int n = _plan.UnknownCount;
        foreach (Share share in _columnShares)
        {
            ReadOnlySpan<int> unknowns = _vectors.Unknowns(share.Of);
            ReadOnlySpan<double> values = _vectors.Values(share.Of);
            for (int i = 0; i < unknowns.Length; i++)
                Add(unknowns[i], values[i] * share.Value * x[n + share.Row], product, size);
        }
        foreach (Share share in _rowShares)
        {
            ReadOnlySpan<int> unknowns = _vectors.Unknowns(share.Of);
            ReadOnlySpan<double> values = _vectors.Values(share.Of);
            for (int i = 0; i < unknowns.Length; i++)
                Add(n + share.Row, values[i] * share.Value * x[unknowns[i]], product, size);
        }
        for (int i = 0; i < Rows; i++)
            for (int j = 0; j < Rows; j++)
                Add(n + i, _corner[i * Rows + j] * x[n + j], product, size);

        void Add(int row, double value, Span<double> products, Span<double> sizes)
        {
            products[row] += sign * value;
            if (!sizes.IsEmpty)
                sizes[row] += Math.Abs(value);
        }
    }

    /// <summary>The matrix with its border, the border's unknowns last.</summary>
    private sealed class Whole(BorderedFactor border) : IRefinable
    {
        private int Interior => border._plan.UnknownCount;

        public int Count => Interior + border.Rows;

        public void Residual(ReadOnlySpan<double> b, ReadOnlySpan<double> x, Span<double> residual, Span<double> size)
        {
            border._factor.Residual(b[..Interior], x[..Interior], residual[..Interior], size[..Interior]);
            for (int i = Interior; i < Count; i++)
            {
                residual[i] = b[i];
                size[i] = Math.Abs(b[i]);
            }
            border.AddBorder(x, residual, size, -1);
            border._plan.ClearHeld(residual, border._isHeld);
        }

        public void Multiply(ReadOnlySpan<double> x, Span<double> product)
        {
            border._factor.Multiply(x[..Interior], product[..Interior]);
            product[Interior..].Clear();
            border.AddBorder(x, product, [], 1);
            border._plan.ClearHeld(product, border._isHeld);
        }

        public void Correct(ReadOnlySpan<double> b, Span<double> x)
        {
            x.Clear();
            border.SolveOnce(b[..Interior], b[Interior..], x[..Interior], x[Interior..]);
        }
    }

    /// <summary>A share of a vector, or of a held root unknown, in a row or column.</summary>
    private readonly record struct Share(int Row, int Of, double Value);
}
