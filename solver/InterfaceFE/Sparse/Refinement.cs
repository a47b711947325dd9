namespace InterfaceFE.Sparse;

/// <summary>
/// Improves solutions with the true matrix. First by iterative refinement in working precision (R. D. Skeel, Math. Comp. 35 (1980) 817, for the componentwise measure). Where
/// that stalls, because pivots were lifted far, by flexible GMRES with the factor as preconditioner (Y. Saad, SIAM J. Sci. Comput. 14 (1993) 461): k lifted pivots are a
/// change of rank k, which k + 1 directions undo.
/// </summary>
internal sealed class Refinement
{
    private const double Target = 4e-16;
    private const double GoodEnough = 1e-13;
    private const int MostSteps = 8;
    private const int Directions = 24;
    private const int Restarts = 3;
    private const int LargestExponent = 1000;

    private readonly IRefinable _system;
    private double[] _residual = [];
    private double[] _size = [];
    private double[] _correction = [];
    private double[] _best = [];
    private double[][] _basis = [];
    private double[][] _preconditioned = [];
    private readonly double[] _hessenberg = new double[(Directions + 1) * Directions];
    private readonly double[] _cosine = new double[Directions];
    private readonly double[] _sine = new double[Directions];
    private readonly double[] _projected = new double[Directions + 1];

    /// <summary>Refines solutions of a system.</summary>
    public Refinement(IRefinable system) => _system = system;

    /// <summary>Refines a solution in place. Returns the steps taken and the componentwise backward error left.</summary>
    public (int Steps, double Error) Run(ReadOnlySpan<double> b, Span<double> x)
    {
        MakeRoom();
        double error = Measure(b, x);
        int steps = 0;
        while (steps < MostSteps && error > Target)
        {
            double improved = Step(b, x, error);
            steps++;
            bool isSlow = !(improved < 0.5 * error);
            error = Math.Min(error, improved);
            if (isSlow)
                break;
        }
        for (int restart = 0; restart < Restarts && error > GoodEnough; restart++)
        {
            x.CopyTo(_best);
            (int directions, double improved) = Project(b, x);
            steps += directions;
            if (!(improved < error))
            {
                _best.CopyTo(x);
                Measure(b, x);
                break;
            }
            error = improved;
            // A plain step after the projection takes off what the projection's own round-off left.
            error = Math.Min(error, Step(b, x, error));
            steps++;
        }
        return (steps, error);
    }

    private void MakeRoom()
    {
        if (_residual.Length == _system.Count)
            return;
        _residual = new double[_system.Count];
        _size = new double[_system.Count];
        _correction = new double[_system.Count];
        _best = new double[_system.Count];
        _basis = [];
    }

    /// <summary>One correction; taken back when it does not improve. Returns the error after it; the residual belongs to what x then is.</summary>
    private double Step(ReadOnlySpan<double> b, Span<double> x, double error)
    {
        x.CopyTo(_best);
        _system.Correct(_residual, _correction);
        for (int i = 0; i < x.Length; i++)
            x[i] += _correction[i];
        double improved = Measure(b, x);
        if (improved < error)
            return improved;
        _best.CopyTo(x);
        Measure(b, x);
        return improved;
    }

    /// <summary>Sets the residual and returns its largest share of |K||x| + |b|.</summary>
    private double Measure(ReadOnlySpan<double> b, ReadOnlySpan<double> x)
    {
        _system.Residual(b, x, _residual, _size);
        double largest = 0;
        for (int i = 0; i < _residual.Length; i++)
        {
            double share = _residual[i] == 0 ? 0 : Math.Abs(_residual[i]) / _size[i];
            if (!(share <= largest))
                largest = share;
        }
        return double.IsNaN(largest) ? double.PositiveInfinity : largest;
    }

    /// <summary>Minimises the residual over a Krylov space of preconditioned directions and adds the result to x.</summary>
    private (int Directions, double Error) Project(ReadOnlySpan<double> b, Span<double> x)
    {
        if (_basis.Length == 0)
        {
            _basis = new double[Directions + 1][];
            _preconditioned = new double[Directions][];
            for (int k = 0; k <= Directions; k++)
                _basis[k] = new double[_system.Count];
            for (int k = 0; k < Directions; k++)
                _preconditioned[k] = new double[_system.Count];
        }
        double start = Norm(_residual);
        if (!(start > 0) || !double.IsFinite(start))
            return (0, double.PositiveInfinity);
        for (int i = 0; i < _residual.Length; i++)
            _basis[0][i] = _residual[i] / start;
        Array.Clear(_projected);
        _projected[0] = start;
        int count = 0;
        while (count < Directions && Math.Abs(_projected[count]) > 1e-16 * start)
        {
            double next = Expand(count);
            Rotate(count);
            count++;
            if (!(next > 0))
                break;
        }
        Combine(count, x);
        return (count, Measure(b, x));
    }

    /// <summary>Adds a direction and its orthonormal image. Returns the length of the new part of the image.</summary>
    private double Expand(int k)
    {
        double[] image = _basis[k + 1];
        _system.Correct(_basis[k], _preconditioned[k]);
        _system.Multiply(_preconditioned[k], image);
        for (int j = 0; j <= k; j++)
            _hessenberg[j * Directions + k] = 0;
        // Twice is enough to keep the images orthogonal.
        for (int pass = 0; pass < 2; pass++)
            for (int j = 0; j <= k; j++)
            {
                double share = Dot(_basis[j], image);
                _hessenberg[j * Directions + k] += share;
                for (int i = 0; i < image.Length; i++)
                    image[i] -= share * _basis[j][i];
            }
        double length = Norm(image);
        _hessenberg[(k + 1) * Directions + k] = length;
        for (int i = 0; i < image.Length && length > 0; i++)
            image[i] /= length;
        return length;
    }

    private void Rotate(int k)
    {
        for (int j = 0; j < k; j++)
        {
            double upper = _hessenberg[j * Directions + k], lower = _hessenberg[(j + 1) * Directions + k];
            _hessenberg[j * Directions + k] = _cosine[j] * upper + _sine[j] * lower;
            _hessenberg[(j + 1) * Directions + k] = _cosine[j] * lower - _sine[j] * upper;
        }
        double a = _hessenberg[k * Directions + k], c = _hessenberg[(k + 1) * Directions + k], radius = Math.Sqrt(a * a + c * c);
        (_cosine[k], _sine[k]) = radius > 0 ? (a / radius, c / radius) : (1, 0);
        _hessenberg[k * Directions + k] = radius;
        _projected[k + 1] = -_sine[k] * _projected[k];
        _projected[k] *= _cosine[k];
    }

    private void Combine(int count, Span<double> x)
    {
        for (int k = count - 1; k >= 0; k--)
        {
            double sum = _projected[k];
            for (int j = k + 1; j < count; j++)
                sum -= _hessenberg[k * Directions + j] * _projected[j];
            double pivot = _hessenberg[k * Directions + k];
            _projected[k] = pivot > 0 ? sum / pivot : 0;
        }
        for (int k = 0; k < count; k++)
            for (int i = 0; i < x.Length; i++)
                x[i] += _projected[k] * _preconditioned[k][i];
    }

    private static double Dot(double[] a, double[] b)
    {
        double sum = 0;
        for (int i = 0; i < a.Length; i++)
            sum += a[i] * b[i];
        return sum;
    }

    /// <summary>Length of a vector, summed in a unit (a power of two) near its largest entry, so that squares stay in range.</summary>
    private static double Norm(double[] a)
    {
        double largest = 0, sum = 0;
        foreach (double value in a)
            largest = Math.Max(largest, Math.Abs(value));
        if (!(largest > 0) || !double.IsFinite(largest))
            return largest;
        double unit = Math.ScaleB(1, Math.Clamp(Math.ILogB(largest), -LargestExponent, LargestExponent)), inverse = 1 / unit;
        foreach (double value in a)
            sum += value * inverse * (value * inverse);
        return Math.Sqrt(sum) * unit;
    }
}
