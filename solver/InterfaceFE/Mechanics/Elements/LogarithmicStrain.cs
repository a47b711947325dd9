namespace InterfaceFE.Mechanics.Elements;

/// <summary>
/// Logarithmic strain of a plane movement, E = ½·ln C with C = Fᵀ·F, its derivative by Green's strain G = ½(C - 1) and the second derivative of stress:E. A material law of small
/// strains is used with E and the stress that does work on it unchanged, and the answer turns with the material (Miehe, Apel and Lambrecht, Comput. Methods Appl. Mech. Eng. 191
/// (2002) 5383-5425, from memory; the plane form is derived here).
/// <para>
/// With m = 1 + Gxx + Gyy, d = Gxx - Gyy, c = 2·Gxy and q = d² + c², the stretches squared are m ± √q, so Exx = a + b·d, Eyy = a - b·d, 2·Exy = 2·b·c with a = ¼·ln(m² - q) and
/// b = artanh(√q/m)/(2√q). Both are smooth functions of m and q, also at q = 0, where b has the series (1/2m)·Σ zᵏ/(2k + 1), z = q/m².
/// </para>
/// Vectors run xx, yy, xy with engineering shear. No allocation; safe between threads.
/// </summary>
internal struct LogarithmicStrain
{
    /// <summary>Share q/m² below which b and its derivatives are taken from their series: a difference of stretches of some 20 %.</summary>
    private const double SeriesBelow = 0.05;

    private const int MostTerms = 24;

    private double _a, _b, _aM, _aQ, _aMm, _aMq, _aQq, _bM, _bQ, _bMm, _bMq, _bQq, _d, _c;

    /// <summary>Takes a displacement gradient: du/dx, du/dy, dv/dx, dv/dy. A gradient that turns the material inside out gives NaN.</summary>
    public static LogarithmicStrain Of(ReadOnlySpan<double> gradient)
    {
        double uX = gradient[0], uY = gradient[1], vX = gradient[2], vY = gradient[3];
        double xx = uX + 0.5 * (uX * uX + vX * vX), yy = vY + 0.5 * (uY * uY + vY * vY), c = uY + vX + uX * uY + vX * vY;
        double volume = (1 + uX) * (1 + vY) - uY * vX;
        double sum = volume > 0 ? xx + yy : double.NaN, m = 1 + sum, d = xx - yy, q = d * d + c * c, rest = sum * (2 + sum) - q, product = 1 + rest;
        var strain = new LogarithmicStrain
        {
            _d = d,
            _c = c,
            _a = 0.25 * LogarithmOfOnePlus(rest),
            _aM = 0.5 * m / product,
            _aQ = -0.25 / product,
            _aMm = 0.5 / product - m * m / (product * product),
            _aMq = 0.5 * m / (product * product),
            _aQq = -0.25 / (product * product),
            _bM = -0.5 / product,
            _bMm = m / (product * product),
            _bMq = -0.5 / (product * product),
        };
        double z = q / (m * m);
        if (z < SeriesBelow)
            strain.TakeSeries(m, z);
        else
        {
            double r = Math.Sqrt(q);
            strain._b = Math.Atanh(r / m) / (2 * r);
            strain._bQ = (0.5 * m / product - strain._b) / (2 * q);
            strain._bQq = (0.25 * m / (product * product) - 1.5 * strain._bQ) / q;
        }
        return strain;
    }

    /// <summary>The strain, length 3, overwritten.</summary>
    public readonly void Strain(Span<double> strain)
    {
        strain[0] = _a + _b * _d;
        strain[1] = _a - _b * _d;
        strain[2] = 2 * _b * _c;
    }

    /// <summary>Derivative of the strain by Green's strain, row-major 3×3, overwritten.</summary>
    public readonly void Derivative(Span<double> derivative)
    {
        double aX = _aM + 2 * _d * _aQ, aY = _aM - 2 * _d * _aQ, aXy = 2 * _c * _aQ, bX = _bM + 2 * _d * _bQ, bY = _bM - 2 * _d * _bQ, bXy = 2 * _c * _bQ;
        derivative[0] = aX + _d * bX + _b;
        derivative[1] = aY + _d * bY - _b;
        derivative[2] = aXy + _d * bXy;
        derivative[3] = aX - _d * bX - _b;
        derivative[4] = aY - _d * bY + _b;
        derivative[5] = aXy - _d * bXy;
        derivative[6] = 2 * _c * bX;
        derivative[7] = 2 * _c * bY;
        derivative[8] = 2 * (_c * bXy + _b);
    }

    /// <summary>Adds the second derivative of stress·strain by Green's strain at fixed stress to a row-major 3×3 matrix.</summary>
    /// <param name="xx">Stress xx [MPa].</param>
    /// <param name="yy">Stress yy [MPa].</param>
    /// <param name="xy">Stress xy [MPa].</param>
    /// <param name="sum">Added to.</param>
    public readonly void AddSecondDerivative(double xx, double yy, double xy, Span<double> sum)
    {
        // stress·strain = p·a + b·k with p = xx + yy, k = s·d + t·c, s = xx - yy, t = 2·xy.
        double p = xx + yy, s = xx - yy, t = 2 * xy, k = s * _d + t * _c;
        double byMm = p * _aMm + k * _bMm, byMq = p * _aMq + k * _bMq, byQq = p * _aQq + k * _bQq, byQ = p * _aQ + k * _bQ;
        Span<double> m = stackalloc double[] { 1, 1, 0 }, q = stackalloc double[] { 2 * _d, -2 * _d, 2 * _c }, turn = stackalloc double[] { s, -s, t }, d = stackalloc double[] { 1, -1, 0 };
        for (int i = 0; i < 3; i++)
        {
            double bI = _bM * m[i] + _bQ * q[i];
            for (int j = 0; j < 3; j++)
            {
                double bJ = _bM * m[j] + _bQ * q[j], qIj = 2 * (d[i] * d[j] + (i == 2 && j == 2 ? 1 : 0));
                sum[3 * i + j] += byMm * m[i] * m[j] + byMq * (m[i] * q[j] + q[i] * m[j]) + byQq * q[i] * q[j] + byQ * qIj + bI * turn[j] + turn[i] * bJ;
            }
        }
    }

    private void TakeSeries(double m, double z)
    {
        double b = 0, first = 0, second = 0, power = 1;
        for (int k = 0; k < MostTerms; k++, power *= z)
        {
            // power = zᵏ: the terms k of b, k + 1 of its first and k + 2 of its second derivative by z.
            b += power / (2 * k + 1);
            first += (k + 1) * power / (2 * k + 3);
            double term = (k + 2) * (k + 1) * power / (2 * k + 5);
            second += term;
            if (term < 1e-17 * second)
                break;
        }
        double inverse = 1 / (m * m);
        _b = 0.5 * b / m;
        _bQ = 0.5 * first / m * inverse;
        _bQq = 0.5 * second / m * inverse * inverse;
    }

    /// <summary>ln(1 + x) without loss for small x (Kahan's form).</summary>
    private static double LogarithmOfOnePlus(double x)
    {
        double shifted = 1 + x;
        return shifted == 1 ? x : Math.Log(shifted) * (x / (shifted - 1));
    }
}
