namespace InterfaceFE.Mechanics.Layers;

/// <summary>A curve that rises in a straight line to its strength S at w0 = S/k; what follows up to the final separation is the curve's own.</summary>
public abstract class RisingCurve : ITractionCurve
{
    /// <summary>Takes stiffness, strength and toughness; the final separation is to be set by the curve.</summary>
    /// <param name="stiffness">Initial stiffness k [MPa/mm], > 0.</param>
    /// <param name="strength">Largest traction S [MPa], > 0.</param>
    /// <param name="toughness">Area Γ [N/mm], > 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is not finite or not above 0.</exception>
    private protected RisingCurve(double stiffness, double strength, double toughness)
    {
        Stiffness = Admissible.Positive(stiffness, nameof(stiffness));
        Strength = Admissible.Positive(strength, nameof(strength));
        Toughness = Admissible.Positive(toughness, nameof(toughness));
        ElasticLimit = Admissible.Positive(strength / stiffness, "strength/stiffness");
    }

    /// <inheritdoc/>
    public double ElasticLimit { get; }

    /// <inheritdoc/>
    public double FinalSeparation { get; private protected init; }

    /// <inheritdoc/>
    public double Stiffness { get; }

    /// <inheritdoc/>
    public double Strength { get; }

    /// <inheritdoc/>
    public double Toughness { get; private protected init; }

    /// <inheritdoc/>
    public double PeakSeparation => ElasticLimit;

    /// <inheritdoc/>
    public double Traction(double separation)
    {
        if (separation >= FinalSeparation)
            return 0;
        return separation <= ElasticLimit ? Stiffness * separation : TractionBeyond(separation);
    }

    /// <inheritdoc/>
    public double Slope(double separation)
    {
        if (separation >= FinalSeparation)
            return 0;
        return separation < ElasticLimit ? Stiffness : SlopeBeyond(separation);
    }

    /// <inheritdoc/>
    public double Area(double separation)
    {
        if (separation >= FinalSeparation)
            return Toughness;
        return separation <= ElasticLimit ? 0.5 * Stiffness * separation * separation : AreaBeyond(separation);
    }

    /// <summary>Traction between elastic limit and final separation [MPa].</summary>
    private protected abstract double TractionBeyond(double separation);

    /// <summary>Slope from the elastic limit up to the final separation [MPa/mm].</summary>
    private protected abstract double SlopeBeyond(double separation);

    /// <summary>Area from 0 to a separation between elastic limit and final separation [N/mm].</summary>
    private protected abstract double AreaBeyond(double separation);
}
