namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Two equal isotropic arms on an elastic layer, pulled apart by P at the distance a from the tip: exact plane elasticity of arms and bond that are long against their root, the layer
/// as springs of traction k·opening. J = P²(a + Δ)²/(b²D) and opening at the load = 2P/(bD)·[(a + Δ)³/3 - p], D = E'h³/12.
/// </summary>
/// <remarks>
/// Derived for the project by Wiener and Hopf's method. By symmetry each arm is a strip free of shear on its lower face, with σ = 2k·v on the joint. A strip answers a normal traction on
/// one face, Fourier-transformed along x, with v = -K·σ, K(s) = (2/(E's))·(sinh x·cosh x + x)/(sinh² x - x²), x = s·h, so that (1/(2k) + K)·σ⁺ = -v⁻. With c⁴ = 2k/D and
/// H = 2k·(1/(2k) + K)·s⁴/(s² + c²)², which is even and tends to 1 at both ends, the solution that grows towards the load as a beam does has
/// Δ = 2/c + (1/π)·∫ ln H ds/s² and p = 2/(3c³) - (1/π)·∫ (ln H - h₂s²) ds/s⁴, both from 0 to ∞, h₂ = h²/5 - 2/c² the coefficient of s² in ln H.
/// With K = 1/(Ds⁴), a Bernoulli beam, that is Δ = (2D/k)^(1/4) and p = -Δ³/6, the beam on springs; a rigid layer gives the 0.673 h of Foote and Buchwald (1985).
/// </remarks>
public sealed class PeelElasticRoot
{
    private const double Lowest = 1e-3, Highest = 1e9, Step = 0.01;

    private readonly double _rigidity, _height, _c;

    /// <summary>Solves the root.</summary>
    /// <param name="modulus">E' of the arms [MPa].</param>
    /// <param name="height">Height of an arm [mm].</param>
    /// <param name="stiffness">Peel stiffness of the layer [MPa/mm].</param>
    public PeelElasticRoot(double modulus, double height, double stiffness)
    {
        _height = height;
        _rigidity = modulus * height * height * height / 12;
        _c = Math.Pow(2 * stiffness / _rigidity, 0.25);
        double second = height * height / 5 - 2 / (_c * _c), start = Lowest * Math.Min(_c, 1 / height), end = Highest * _c;

        // Below the start the integrands are constants; up to the end trapezoids in ln s, ds = s·d(ln s).
        double first = LogH(start) / start, third = (LogH(start) - second * start * start) / (start * start * start);
        int count = (int)Math.Ceiling(Math.Log(end / start) / Step);
        double step = Math.Log(end / start) / count;
        for (int i = 0; i <= count; i++)
        {
            double s = start * Math.Exp(i * step), log = LogH(s), weight = i == 0 || i == count ? 0.5 * step : step;
            first += weight * log / s;
            third += weight * (log - second * s * s) / (s * s * s);
        }
        // Beyond the end ln H is next to nothing, and -h₂/s² is left.
        third -= second / end;
        RootLength = 2 / _c + first / Math.PI;
        Rest = 2 / (3 * _c * _c * _c) - third / Math.PI;
    }

    /// <summary>Δ [mm].</summary>
    public double RootLength { get; }

    /// <summary>p [mm³].</summary>
    public double Rest { get; }

    /// <summary>Opening at the load per force [mm/N].</summary>
    /// <param name="crack">Crack length [mm].</param>
    /// <param name="width">Width [mm].</param>
    public double Compliance(double crack, double width)
    {
        double length = crack + RootLength;
        return 2 / (width * _rigidity) * (length * length * length / 3 - Rest);
    }

    private double LogH(double s)
    {
        double x = s * _height, c2 = _c * _c, s2 = s * s;
        return Math.Log((s2 * s2 + c2 * c2 * StripOverBeam(x)) / ((s2 + c2) * (s2 + c2)));
    }

    /// <summary>K of the strip over K of a Bernoulli beam: (x³/6)·(sinh x·cosh x + x)/(sinh² x - x²); by its series where that cancels.</summary>
    private static double StripOverBeam(double x)
    {
        if (x > 20)
            return x * x * x / 6;
        if (x > 1)
            return x * x * x / 6 * (Math.Sinh(x) * Math.Cosh(x) + x) / (Math.Sinh(x) * Math.Sinh(x) - x * x);
        double y = 4 * x * x, above = 1, below = 1.0 / 24, term = 1, numerator = 1, denominator = below;
        // Numerator/(2x) = ½·(1 + Σ y^m/(2m+1)!), denominator/(16x⁴/2) = Σ y^m/(2m+4)!.
        numerator = 0.5 * (1 + above);
        for (int m = 1; m < 14; m++)
        {
            term *= y / ((2 * m) * (2 * m + 1));
            numerator += 0.5 * term;
            below *= y / ((2 * m + 3) * (2 * m + 4));
            denominator += below;
        }
        return numerator * 2 / (6 * 8 * denominator);
    }
}
