namespace InterfaceFE.Sparse;

/// <summary>
/// Symmetric indefinite dense factor P A Pᵀ = L D Lᵀ with 1×1 and 2×2 pivots by partial pivoting (J. R. Bunch and L. Kaufman, Math. Comp. 31 (1977) 163). The signs of D
/// are those of the eigenvalues (Sylvester).
/// </summary>
internal sealed class SymmetricRoot : DenseRoot
{
    // (1 + √17) / 8 bounds the growth of both kinds of pivot alike.
    private static readonly double Alpha = (1 + Math.Sqrt(17)) / 8;

    private readonly int[] _order;
    private readonly double[] _permuted;
    private readonly double[] _first;
    private readonly double[] _second;
    // Per pivot: 1 or 2 rows wide (the second row of a pair has 0), -1 where numerically zero.
    private readonly int[] _kind;

    public SymmetricRoot(int size, int borderRows = 0)
        : base(size, borderRows)
    {
        size += borderRows;
        _order = new int[size];
        _permuted = new double[size];
        _first = new double[size];
        _second = new double[size];
        _kind = new int[size];
    }

    /// <inheritdoc/>
    protected override void Decompose()
    {
        int positive = 0, negative = 0, zero = 0;
        for (int i = 0; i < Count; i++)
            _order[i] = i;
        for (int k = 0; k < Count;)
        {
            int width = ChoosePivot(k);
            if (width == 2)
            {
                // A pair chosen by this rule always has a negative determinant.
                positive++;
                negative++;
                EliminatePair(k);
                _kind[k] = 2;
                _kind[k + 1] = 0;
                k += 2;
                continue;
            }
            double pivot = Matrix[k * Count + k];
            if (width < 0)
                zero++;
            else if (pivot > 0)
                positive++;
            else
                negative++;
            _kind[k] = width;
            EliminateOne(k, width < 0);
            k++;
        }
        Inertia = new Inertia(positive, negative, zero);
    }

    /// <inheritdoc/>
    protected override void Substitute()
    {
        int n = Count;
        for (int i = 0; i < n; i++)
        {
            double sum = Work[_order[i]];
            for (int j = 0; j < i; j++)
                sum -= Matrix[i * n + j] * _permuted[j];
            _permuted[i] = sum;
        }
        for (int k = 0; k < n; k++)
        {
            if (_kind[k] == 2)
            {
                double a = Matrix[k * n + k], b = _first[k], c = Matrix[(k + 1) * n + k + 1], determinant = a * c - b * b;
                (_permuted[k], _permuted[k + 1]) = ((c * _permuted[k] - b * _permuted[k + 1]) / determinant, (a * _permuted[k + 1] - b * _permuted[k]) / determinant);
            }
            else if (_kind[k] != 0)
                _permuted[k] = _kind[k] < 0 ? 0 : _permuted[k] / Matrix[k * n + k];
        }
        for (int i = n - 1; i >= 0; i--)
            Subtract(_permuted.AsSpan(0, i), Matrix.AsSpan(i * n, i), _permuted[i]);
        for (int i = 0; i < n; i++)
            Work[_order[i]] = _permuted[i];
    }

    /// <inheritdoc/>
    protected override void Probe(int k, Span<double> vector, bool left)
    {
        Span<double> z = _permuted.AsSpan(0, Count);
        z.Clear();
        z[k] = 1;
        for (int i = k; i > 0; i--)
            Subtract(z[..i], Matrix.AsSpan(i * Count, i), z[i]);
        for (int i = 0; i < Count; i++)
            vector[_order[i]] = z[i];
    }

    /// <summary>Brings the next pivot to the front: 1 or 2 rows wide, -1 where its row is numerically zero.</summary>
    private int ChoosePivot(int k)
    {
        double diagonal = Math.Abs(Matrix[k * Count + k]);
        (double largest, int row) = LargestOffDiagonal(k, k);
        if (IsZero(Math.Max(diagonal, largest), k))
            return -1;
        if (diagonal >= Alpha * largest)
            return 1;
        (double other, _) = LargestOffDiagonal(row, k);
        if (diagonal * other >= Alpha * largest * largest)
            return 1;
        if (Math.Abs(Matrix[row * Count + row]) >= Alpha * other)
        {
            Exchange(k, row);
            return 1;
        }
        Exchange(k + 1, row);
        return 2;
    }

    /// <summary>Largest off-diagonal entry of a row of the part from k on, read from the lower triangle.</summary>
    private (double Size, int Column) LargestOffDiagonal(int row, int k)
    {
        double largest = 0;
        int at = row;
        for (int j = k; j < Count; j++)
        {
            double size = Math.Abs(j < row ? Matrix[row * Count + j] : Matrix[j * Count + row]);
            if (j == row || size <= largest)
                continue;
            largest = size;
            at = j;
        }
        return (largest, at);
    }

    private void Exchange(int a, int b)
    {
        if (a == b)
            return;
        int n = Count;
        // Finished columns belong to the rows of L; in the rest rows and columns go together, within the lower triangle.
        for (int j = 0; j < a; j++)
            Swap<double>(Matrix, a * n + j, b * n + j);
        for (int i = a + 1; i < b; i++)
            Swap<double>(Matrix, i * n + a, b * n + i);
        for (int i = b + 1; i < n; i++)
            Swap<double>(Matrix, i * n + a, i * n + b);
        Swap<double>(Matrix, a * n + a, b * n + b);
        Swap<int>(_order, a, b);
    }

    private void EliminateOne(int k, bool isZero)
    {
        int n = Count;
        double pivot = Matrix[k * n + k];
        for (int i = k + 1; i < n; i++)
            _second[i] = Matrix[i * n + k];
        for (int i = k + 1; i < n; i++)
        {
            double multiplier = isZero ? 0 : _second[i] / pivot;
            Matrix[i * n + k] = multiplier;
            if (multiplier != 0)
                Subtract(Matrix.AsSpan(i * n + k + 1, i - k), _second.AsSpan(k + 1, i - k), multiplier);
        }
    }

    private void EliminatePair(int k)
    {
        int n = Count;
        double a = Matrix[k * n + k], b = Matrix[(k + 1) * n + k], c = Matrix[(k + 1) * n + k + 1], determinant = a * c - b * b;
        // L has a zero here; the pair's off-diagonal entry is kept aside.
        Matrix[(k + 1) * n + k] = 0;
        for (int i = k + 2; i < n; i++)
        {
            _permuted[i] = Matrix[i * n + k];
            _second[i] = Matrix[i * n + k + 1];
        }
        for (int i = k + 2; i < n; i++)
        {
            double l0 = (c * _permuted[i] - b * _second[i]) / determinant, l1 = (a * _second[i] - b * _permuted[i]) / determinant;
            Subtract(Matrix.AsSpan(i * n + k + 2, i - k - 1), _permuted.AsSpan(k + 2, i - k - 1), l0);
            Subtract(Matrix.AsSpan(i * n + k + 2, i - k - 1), _second.AsSpan(k + 2, i - k - 1), l1);
            Matrix[i * n + k] = l0;
            Matrix[i * n + k + 1] = l1;
        }
        _first[k] = b;
    }
}
