namespace InterfaceFE.Sparse;

/// <summary>Dense L U factor with partial pivoting of rows. The counts of signs are those of the pivots, one of them turned when the permutation is odd, so that their product has the sign of the determinant.</summary>
internal sealed class GeneralRoot : DenseRoot
{
    private readonly int[] _exchanged;
    private readonly bool[] _isZero;

    public GeneralRoot(int size, int borderRows = 0)
        : base(size, borderRows)
    {
        size += borderRows;
        _exchanged = new int[size];
        _isZero = new bool[size];
    }

    /// <inheritdoc/>
    protected override void Decompose()
    {
        int n = Count, positive = 0, negative = 0, zero = 0;
        bool isOdd = false;
        for (int k = 0; k < n; k++)
        {
            int best = k;
            for (int i = k + 1; i < n; i++)
                if (Math.Abs(Matrix[i * n + k]) > Math.Abs(Matrix[best * n + k]))
                    best = i;
            _exchanged[k] = best;
            if (best != k)
            {
                isOdd = !isOdd;
                for (int j = 0; j < n; j++)
                    Swap<double>(Matrix, k * n + j, best * n + j);
            }
            double pivot = Matrix[k * n + k];
            _isZero[k] = IsZero(pivot, k);
            if (_isZero[k])
                zero++;
            else if (pivot > 0)
                positive++;
            else
                negative++;
            for (int i = k + 1; i < n; i++)
            {
                double multiplier = _isZero[k] ? 0 : Matrix[i * n + k] / pivot;
                Matrix[i * n + k] = multiplier;
                if (multiplier != 0)
                    Subtract(Matrix.AsSpan(i * n + k + 1, n - k - 1), Matrix.AsSpan(k * n + k + 1, n - k - 1), multiplier);
            }
        }
        if (isOdd && negative > 0)
            (positive, negative) = (positive + 1, negative - 1);
        else if (isOdd && positive > 0)
            (positive, negative) = (positive - 1, negative + 1);
        Inertia = new Inertia(positive, negative, zero);
    }

    /// <inheritdoc/>
    protected override void Probe(int k, Span<double> vector, bool left)
    {
        int n = Count;
        vector[..n].Clear();
        vector[k] = 1;
        if (!left)
        {
            for (int j = k - 1; j >= 0; j--)
            {
                for (int i = j + 1; i <= k; i++)
                    vector[j] -= Matrix[j * n + i] * vector[i];
                vector[j] = _isZero[j] ? 0 : vector[j] / Matrix[j * n + j];
            }
            return;
        }
        for (int i = k; i > 0; i--)
            Subtract(vector[..i], Matrix.AsSpan(i * n, i), vector[i]);
        for (int i = k; i >= 0; i--)
            Swap(vector, i, _exchanged[i]);
    }

    /// <inheritdoc/>
    protected override void Substitute()
    {
        int n = Count;
        for (int k = 0; k < n; k++)
            Swap<double>(Work, k, _exchanged[k]);
        for (int i = 0; i < n; i++)
            for (int j = 0; j < i; j++)
                Work[i] -= Matrix[i * n + j] * Work[j];
        for (int i = n - 1; i >= 0; i--)
        {
            for (int j = i + 1; j < n; j++)
                Work[i] -= Matrix[i * n + j] * Work[j];
            Work[i] = _isZero[i] ? 0 : Work[i] / Matrix[i * n + i];
        }
    }
}
