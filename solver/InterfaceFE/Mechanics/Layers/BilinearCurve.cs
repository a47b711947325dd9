namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Bilinear curve: linear rise to the strength S at w0 = S/k, linear fall to 0 at wf = 2·Γ/S.
/// T(w) = k·w for w ≤ w0, S·(wf - w)/(wf - w0) up to wf. Source: Alfano and Crisfield 2001 (from memory); area by triangles.
/// </summary>
public sealed class BilinearCurve : RisingCurve
{
    /// <summary>Curve from stiffness, strength and toughness.</summary>
    /// <param name="stiffness">Initial stiffness k [MPa/mm], > 0.</param>
    /// <param name="strength">Largest traction S [MPa], > 0.</param>
    /// <param name="toughness">Area Γ [N/mm], above S²/(2k), so that the curve falls after its peak.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is not finite, not above 0, or the toughness is not above S²/(2k).</exception>
    public BilinearCurve(double stiffness, double strength, double toughness)
        : base(stiffness, strength, toughness)
    {
        FinalSeparation = 2 * toughness / strength;
        if (!double.IsFinite(FinalSeparation) || FinalSeparation <= ElasticLimit)
            throw new ArgumentOutOfRangeException(nameof(toughness), toughness, Admissible.Text($"toughness must be above strength²/(2·stiffness) = {0.5 * strength * ElasticLimit:R} N/mm, else the curve has no falling part"));
    }

    /// <inheritdoc/>
    private protected override double TractionBeyond(double separation) =>
        Strength * ((FinalSeparation - separation) / (FinalSeparation - ElasticLimit));

    /// <inheritdoc/>
    private protected override double SlopeBeyond(double separation) => -Strength / (FinalSeparation - ElasticLimit);

    /// <inheritdoc/>
    private protected override double AreaBeyond(double separation)
    {
        double left = FinalSeparation - separation;
        return Toughness - 0.5 * Strength * left * (left / (FinalSeparation - ElasticLimit));
    }
}
