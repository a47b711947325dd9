namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Linear rise to the strength S at w0 = S/k, then T = S·(exp(-a·ξ) - exp(-a))/(1 - exp(-a)) with ξ = (w - w0)/(wf - w0), exactly 0 at wf.
/// Toughness Γ = ½·S·w0 + S·(wf - w0)·φ(a), φ(a) = 1/a - 1/(exp(a) - 1), which falls from 1 (a → -∞, a plateau) over ½ (a = 0, linear) to 0 (a → ∞).
/// Shape common in damage mechanics, no source; area derived by integration.
/// </summary>
/// <remarks>
/// With u = 1 - ξ and p(y) = (exp(y) - 1)/y, r(y) = (exp(y) - 1 - y)/y²: T = S·u·p(a·u)/p(a), area left = S·(wf - w0)·u²·r(a·u)/p(a).
/// These have no cancellation for a ≤ 1; above, the plain forms are used, which have none there and cannot overflow.
/// </remarks>
public sealed class ExponentialCurve : RisingCurve
{
    private readonly double _length;
    private readonly double _lastShare;

    /// <summary>Curve from stiffness, strength, toughness and final separation.</summary>
    /// <param name="stiffness">Initial stiffness k [MPa/mm], > 0.</param>
    /// <param name="strength">Largest traction S [MPa], > 0.</param>
    /// <param name="toughness">Area Γ up to the final separation [N/mm], strictly between ½·S·w0 and ½·S·w0 + S·(wf - w0).</param>
    /// <param name="finalSeparation">wf [mm], above w0 = S/k.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is nonsense, or the toughness is outside its range.</exception>
    public ExponentialCurve(double stiffness, double strength, double toughness, double finalSeparation)
        : base(stiffness, strength, toughness)
    {
        FinalSeparation = Admissible.Positive(finalSeparation, nameof(finalSeparation));
        if (FinalSeparation <= ElasticLimit)
            throw new ArgumentOutOfRangeException(nameof(finalSeparation), finalSeparation, Admissible.Text($"finalSeparation must be above strength/stiffness = {ElasticLimit:R} mm"));
        _length = FinalSeparation - ElasticLimit;
        double least = 0.5 * strength * ElasticLimit, most = least + strength * _length;
        double share = (toughness - least) / (strength * _length);
        if (!(share is > 1e-6 and < 1 - 1e-6))
            throw new ArgumentOutOfRangeException(nameof(toughness), toughness, Admissible.Text($"toughness must lie between {least:R} and {most:R} N/mm for this stiffness, strength and final separation"));
        Decay = SolveDecay(share);
        _lastShare = Math.Exp(-Math.Max(Decay, 0));
    }

    /// <summary>Decay a [-]; 0 is a linear fall, below 0 the curve bulges.</summary>
    public double Decay { get; }

    /// <inheritdoc/>
    private protected override double TractionBeyond(double separation)
    {
        if (Decay > 1)
            return Strength * (Math.Exp(-Decay * ((separation - ElasticLimit) / _length)) - _lastShare) / (1 - _lastShare);
        double u = (FinalSeparation - separation) / _length;
        return Strength * (u * FirstQuotient(Decay * u) / FirstQuotient(Decay));
    }

    /// <inheritdoc/>
    private protected override double SlopeBeyond(double separation)
    {
        if (Decay > 1)
            return -Strength * Decay / _length * Math.Exp(-Decay * ((separation - ElasticLimit) / _length)) / (1 - _lastShare);
        double u = (FinalSeparation - separation) / _length;
        return -Strength / _length * Math.Exp(Decay * u) / FirstQuotient(Decay);
    }

    /// <inheritdoc/>
    private protected override double AreaBeyond(double separation)
    {
        double u = (FinalSeparation - separation) / _length;
        return Toughness - Strength * _length * AreaLeft(Decay, u);
    }

    /// <summary>Area left, over S·(wf - w0), at u = 1 - ξ.</summary>
    private static double AreaLeft(double a, double u)
    {
        if (a <= 1)
            return u * u * SecondQuotient(a * u) / FirstQuotient(a);
        double y = a * u, last = Math.Exp(-a);
        return y < 1
            ? u * u * SecondQuotient(y) * a * last / (1 - last)
            : (Math.Exp(y - a) - (1 + y) * last) / (a * (1 - last));
    }

    /// <summary>Decay whose φ is a given share; φ(a) + φ(-a) = 1, so only a ≥ 0 is searched, within 0 and 1/share.</summary>
    private static double SolveDecay(double share)
    {
        double target = Math.Min(share, 1 - share);
        if (target >= 0.5)
            return 0;
        double low = 0, high = 1 / target;
        for (int i = 0; i < 200; i++)
        {
            double middle = 0.5 * (low + high);
            if (middle <= low || middle >= high)
                break;
            if (AreaLeft(middle, 1) > target)
                low = middle;
            else
                high = middle;
        }
        return share <= 0.5 ? low : -low;
    }

    /// <summary>(exp(y) - 1)/y.</summary>
    private static double FirstQuotient(double y) => Math.Abs(y) > 0.5 ? (Math.Exp(y) - 1) / y : 1 + y * SecondQuotient(y);

    /// <summary>(exp(y) - 1 - y)/y²; a power series where the difference would cancel.</summary>
    private static double SecondQuotient(double y)
    {
        if (Math.Abs(y) > 0.5)
            return (Math.Exp(y) - 1 - y) / (y * y);
        double sum = 0;
        for (int n = 16; n >= 3; n--)
            sum = (1 + sum) * y / n;
        return 0.5 * (1 + sum);
    }
}
