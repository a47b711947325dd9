namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Trapezoid: linear rise to the strength S at w0 = S/k, plateau to wp, linear fall to 0 at wf; Γ = ½·S·(wf + wp - w0).
/// What is left out of wp and wf follows from the toughness; with both left out wp = ⅔·wf, so wf = 0.6·(2·Γ/S + w0).
/// Source: the shape of Tvergaard and Hutchinson 1992 (from memory); area by pieces.
/// </summary>
public sealed class TrapezoidCurve : RisingCurve
{
    /// <summary>Relative difference allowed between a toughness and the area of a curve that is over-determined.</summary>
    public const double ToughnessAgreement = 1e-3;

    /// <summary>Curve from stiffness, strength, toughness and, if known, the ends of plateau and curve.</summary>
    /// <param name="stiffness">Initial stiffness k [MPa/mm], > 0.</param>
    /// <param name="strength">Traction of the plateau S [MPa], > 0.</param>
    /// <param name="toughness">Area Γ [N/mm], > 0.</param>
    /// <param name="plateauEnd">wp [mm], at least S/k and below wf; NaN: left out.</param>
    /// <param name="finalSeparation">wf [mm], above wp; NaN: left out.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is nonsense, w0 ≤ wp &lt; wf is violated, or all five numbers are given and the area differs from the toughness.</exception>
    public TrapezoidCurve(double stiffness, double strength, double toughness, double plateauEnd = double.NaN, double finalSeparation = double.NaN)
        : base(stiffness, strength, toughness)
    {
        double sum = 2 * toughness / strength + ElasticLimit;
        bool plateauGiven = !double.IsNaN(plateauEnd), finalGiven = !double.IsNaN(finalSeparation);
        if (plateauGiven)
            Admissible.Positive(plateauEnd, nameof(plateauEnd));
        if (finalGiven)
            Admissible.Positive(finalSeparation, nameof(finalSeparation));
        FinalSeparation = finalGiven ? finalSeparation : plateauGiven ? sum - plateauEnd : 0.6 * sum;
        PlateauEnd = plateauGiven ? plateauEnd : finalGiven ? sum - finalSeparation : FinalSeparation * 2 / 3;
        if (!(PlateauEnd >= ElasticLimit && FinalSeparation > PlateauEnd && double.IsFinite(FinalSeparation)))
            throw new ArgumentOutOfRangeException(nameof(toughness), toughness, Admissible.Text($"toughness leads to a plateau that ends at {PlateauEnd:R} mm and a curve that ends at {FinalSeparation:R} mm; needed: strength/stiffness = {ElasticLimit:R} mm <= plateau end < final separation"));
        Toughness = 0.5 * strength * (FinalSeparation + PlateauEnd - ElasticLimit);
        if (Math.Abs(Toughness - toughness) > ToughnessAgreement * toughness)
            throw new ArgumentOutOfRangeException(nameof(toughness), toughness, Admissible.Text($"toughness must agree within {ToughnessAgreement:P1} with the area of the curve, {Toughness:R} N/mm, when plateau end and final separation are both given"));
    }

    /// <summary>End of the plateau [mm].</summary>
    public double PlateauEnd { get; }

    /// <inheritdoc/>
    private protected override double TractionBeyond(double separation) =>
        separation <= PlateauEnd ? Strength : Strength * ((FinalSeparation - separation) / (FinalSeparation - PlateauEnd));

    /// <inheritdoc/>
    private protected override double SlopeBeyond(double separation) => separation < PlateauEnd ? 0 : -Strength / (FinalSeparation - PlateauEnd);

    /// <inheritdoc/>
    private protected override double AreaBeyond(double separation)
    {
        if (separation <= PlateauEnd)
            return Strength * (separation - 0.5 * ElasticLimit);
        double left = FinalSeparation - separation;
        return Toughness - 0.5 * Strength * left * (left / (FinalSeparation - PlateauEnd));
    }
}
