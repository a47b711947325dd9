namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// One mode of the coupled potential of Park, Paulino and Roesler, J. Mech. Phys. Solids 57 (2009) 891-908 (formulas from memory). With x = separation/δ the energy left is Γ·g(x),
/// g = (1 - x)^α·(1 + c·x)^m, m = α(α - 1)λ²/(1 - αλ²), c = α/m; g(0) = 1, g(1) = 0. Traction of the mode alone -Γ·g'(x)/δ = Γ/δ·α(1 + c)·x·(1 - x)^(α-1)·(1 + c·x)^(m-1), largest at x = λ;
/// δ follows from the strength there.
/// </summary>
public sealed class PotentialMode
{
    private readonly double _shape;
    private readonly double _rise;
    private readonly double _steepness;

    /// <summary>Mode from strength, toughness, exponent and initial slope indicator.</summary>
    /// <param name="strength">Largest traction of the mode alone S [MPa], > 0.</param>
    /// <param name="toughness">Energy of the mode alone Γ [N/mm], > 0.</param>
    /// <param name="exponent">α: above 1, at most 20. 2: an almost straight fall; above: hollow; below: bulging.</param>
    /// <param name="initialSlope">λ: separation at the strength over the final one, above 0, at most 1/√(2α - 1), beyond which damage would fall at first.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public PotentialMode(double strength, double toughness, double exponent, double initialSlope)
    {
        Strength = Admissible.Positive(strength, nameof(strength));
        Toughness = Admissible.Positive(toughness, nameof(toughness));
        if (!(exponent is > 1 and <= 20))
            throw new ArgumentOutOfRangeException(nameof(exponent), exponent, "exponent must be above 1 and at most 20");
        Admissible.Positive(initialSlope, nameof(initialSlope));
        Admissible.Within(initialSlope, 0, 1 / Math.Sqrt(2 * exponent - 1), nameof(initialSlope));
        Exponent = exponent;
        InitialSlope = initialSlope;
        double left = 1 - exponent * initialSlope * initialSlope;
        _shape = exponent * (exponent - 1) * initialSlope * initialSlope / left;
        _rise = left / ((exponent - 1) * initialSlope * initialSlope);
        _steepness = exponent * (1 + _rise);
        FinalSeparation = Admissible.Positive(toughness / strength * initialSlope * Secant(initialSlope), "final separation");
        Stiffness = Admissible.Positive(toughness * _steepness / FinalSeparation / FinalSeparation, "stiffness");
    }

    /// <summary>S [MPa].</summary>
    public double Strength { get; }

    /// <summary>Γ [N/mm].</summary>
    public double Toughness { get; }

    /// <summary>α.</summary>
    public double Exponent { get; }

    /// <summary>λ.</summary>
    public double InitialSlope { get; }

    /// <summary>δ [mm].</summary>
    public double FinalSeparation { get; }

    /// <summary>Slope at zero separation of the mode alone [MPa/mm].</summary>
    public double Stiffness { get; }

    /// <summary>g(x), 0 from x = 1.</summary>
    internal double Left(double x) => x >= 1 ? 0 : Math.Pow(1 - x, Exponent) * Math.Pow(1 + _rise * x, _shape);

    /// <summary>-g'(x)/x, finite at 0.</summary>
    internal double Secant(double x) => x >= 1 ? 0 : _steepness * Math.Pow(1 - x, Exponent - 1) * Math.Pow(1 + _rise * x, _shape - 1);

    /// <summary>d(-g'(x)/x)/dx, never above 0.</summary>
    internal double SecantSlope(double x) => x >= 1 ? 0 : Secant(x) * ((_shape - 1) * _rise / (1 + _rise * x) - (Exponent - 1) / (1 - x));

    /// <summary>Energy of the mode alone spent for good at a largest separation, 1 - g + ½·x·g', over Γ; counted from the strength on and scaled to end at 1, 0 before.</summary>
    internal double Damage(double x)
    {
        if (x <= InitialSlope)
            return 0;
        double atPeak = Spent(InitialSlope);
        return Math.Clamp((Spent(x) - atPeak) / (1 - atPeak), 0, 1);
    }

    /// <summary>x at which g(x) is a given share from 0 to 1, by halving.</summary>
    internal double WhereLeft(double share)
    {
        double low = 0, high = 1;
        for (int i = 0; i < 200; i++)
        {
            double middle = 0.5 * (low + high);
            if (middle <= low || middle >= high)
                break;
            if (Left(middle) > share)
                low = middle;
            else
                high = middle;
        }
        return high;
    }

    private double Spent(double x) => 1 - Left(x) - 0.5 * x * x * Secant(x);
}
