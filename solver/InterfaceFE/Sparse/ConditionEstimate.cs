namespace InterfaceFE.Sparse;

/// <summary>
/// Estimate of a condition number in the 1-norm by a few solves (W. W. Hager, SIAM J. Sci. Stat. Comput. 5 (1984) 311; N. J. Higham, ACM Trans. Math. Softw. 14 (1988) 381): a
/// lower bound, seldom off by more than three. Rows and columns are scaled by the square roots of the unknowns' scales, so that units do not count.
/// </summary>
internal sealed class ConditionEstimate
{
    private const int MostSteps = 5;

    private readonly WorkingFactor _factor;
    private readonly int[] _held;
    private readonly bool[] _isFree;
    private readonly double[] _scaling;
    private readonly double[] _right;
    private readonly double[] _solution;

    /// <summary>Prepares an estimate of a factored matrix without the held unknowns.</summary>
    public ConditionEstimate(WorkingFactor factor, ReadOnlySpan<int> held)
    {
        _factor = factor;
        _held = held.ToArray();
        _isFree = new bool[factor.Size];
        Array.Fill(_isFree, true);
        foreach (int unknown in held)
            _isFree[unknown] = false;
        _scaling = new double[factor.Size];
        for (int i = 0; i < factor.Size; i++)
            _scaling[i] = 1 / Math.Sqrt(factor.Fronts.Scale(factor.Plan.NewOf[i]));
        _right = new double[factor.Size];
        _solution = new double[factor.Size];
    }

    /// <summary>The estimate; 1 for a matrix without free unknowns.</summary>
    public double Run()
    {
        int free = _isFree.Count(isFree => isFree);
        return free == 0 ? 1 : Norm() * InverseNorm(free);
    }

    /// <summary>Largest sum of magnitudes in a column of the scaled matrix; magnitudes of slots are summed, so that it is an upper bound.</summary>
    private double Norm()
    {
        var zero = new double[_factor.Size];
        for (int i = 0; i < _factor.Size; i++)
            _solution[i] = _isFree[i] ? _scaling[i] : 0;
        _factor.Residual(zero, _solution, _right, zero);
        double largest = 0;
        for (int i = 0; i < _factor.Size; i++)
            if (_isFree[i])
                largest = Math.Max(largest, zero[i] * _scaling[i]);
        return largest;
    }

    private double InverseNorm(int free)
    {
        var signs = new double[_factor.Size];
        var x = new double[_factor.Size];
        for (int i = 0; i < x.Length; i++)
            x[i] = _isFree[i] ? 1.0 / free : 0;
        double estimate = 0;
        for (int step = 0; step < MostSteps; step++)
        {
            double norm = Solve(x);
            bool isSame = true;
            for (int i = 0; i < x.Length; i++)
            {
                double sign = _solution[i] < 0 ? -1 : 1;
                isSame &= sign == signs[i] || !_isFree[i];
                signs[i] = _isFree[i] ? sign : 0;
            }
            if (norm <= estimate || (isSame && step > 0))
                break;
            estimate = norm;
            double along = Solve(signs, x);
            int largest = 0;
            for (int i = 0; i < x.Length; i++)
                if (Math.Abs(_solution[i]) > Math.Abs(_solution[largest]))
                    largest = i;
            if (step > 0 && Math.Abs(_solution[largest]) <= along)
                break;
            Array.Clear(x);
            x[largest] = 1;
        }
        // Higham's second look: alternating signs of growing size catch what cancels above.
        int at = 0;
        for (int i = 0; i < x.Length; i++)
        {
            x[i] = _isFree[i] ? (at % 2 == 0 ? 1 : -1) * (1 + (free > 1 ? (double)at / (free - 1) : 0)) : 0;
            at += _isFree[i] ? 1 : 0;
        }
        return Math.Max(estimate, 2 * Solve(x) / (3 * free));
    }

    /// <summary>Solution of the scaled system; returns its 1-norm.</summary>
    private double Solve(double[] b)
    {
        Solve(b, b);
        double sum = 0;
        for (int i = 0; i < b.Length; i++)
            sum += Math.Abs(_solution[i]);
        return sum;
    }

    /// <summary>Solution of the scaled system; returns its product with another vector.</summary>
    private double Solve(double[] b, double[] other)
    {
        for (int i = 0; i < b.Length; i++)
        {
            _right[i] = b[i] / _scaling[i];
            _solution[i] = 0;
        }
        _factor.Solve(_right, _solution, _held);
        double product = 0;
        for (int i = 0; i < b.Length; i++)
        {
            _solution[i] = _isFree[i] ? _solution[i] / _scaling[i] : 0;
            product += _solution[i] * other[i];
        }
        return product;
    }
}
