namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Linear rise to the strength S at w0 = S/k, then a parabola with its top at the strength, 0 at wf: T = S·(1 - ξ²), ξ = (w - w0)/(wf - w0).
/// Γ = ½·S·w0 + ⅔·S·(wf - w0), so wf = 3·Γ/(2·S) + w0/4. It falls gently at first and lies between trapezoid and bilinear.
/// Source: one of the shapes compared by Alfano, Compos. Sci. Technol. 66 (2006) 723-730 (from memory); area derived by integration.
/// </summary>
public sealed class LinearParabolicCurve : RisingCurve
{
    private readonly double _length;

    /// <summary>Curve from stiffness, strength and toughness.</summary>
    /// <param name="stiffness">Initial stiffness k [MPa/mm], > 0.</param>
    /// <param name="strength">Largest traction S [MPa], > 0.</param>
    /// <param name="toughness">Area Γ [N/mm], above S²/(2k), so that the curve falls after its peak.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is not finite, not above 0, or the toughness is not above S²/(2k).</exception>
    public LinearParabolicCurve(double stiffness, double strength, double toughness)
        : base(stiffness, strength, toughness)
    {
        FinalSeparation = 1.5 * toughness / strength + 0.25 * ElasticLimit;
        _length = FinalSeparation - ElasticLimit;
        if (!double.IsFinite(FinalSeparation) || _length <= 0)
            throw new ArgumentOutOfRangeException(nameof(toughness), toughness, Admissible.Text($"toughness must be above strength²/(2·stiffness) = {0.5 * strength * ElasticLimit:R} N/mm, else the curve has no falling part"));
    }

    /// <inheritdoc/>
    private protected override double TractionBeyond(double separation)
    {
        // With u = 1 - ξ there is no cancellation near the end.
        double u = (FinalSeparation - separation) / _length;
        return Strength * u * (2 - u);
    }

    /// <inheritdoc/>
    private protected override double SlopeBeyond(double separation) => -2 * Strength * (separation - ElasticLimit) / (_length * _length);

    /// <inheritdoc/>
    private protected override double AreaBeyond(double separation)
    {
        double u = (FinalSeparation - separation) / _length;
        return Toughness - Strength * _length * u * u * (1 - u / 3);
    }
}
