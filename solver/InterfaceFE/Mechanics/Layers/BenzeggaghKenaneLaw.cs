namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// One damage variable with toughness by Benzeggagh and Kenane 1996: G_c(B) = Γ_I + (Γ_II - Γ_I)·B^η. Onset Y0(B) = Y_I + (Y_II - Y_I)·B^η, Y_i = S_i²/(2·K_i)
/// (form of Turon et al. 2010, from memory). Exponents below ½ have an infinite slope at pure peel.
/// </summary>
public sealed class BenzeggaghKenaneLaw : OneDamageLaw
{
    private readonly double _exponent;

    /// <summary>Law from two bilinear curves and an exponent.</summary>
    /// <param name="peel">Curve of pure peel.</param>
    /// <param name="shear">Curve of pure shear.</param>
    /// <param name="exponent">η, from 0.1 to 20.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <exception cref="ArgumentNullException">A curve is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public BenzeggaghKenaneLaw(BilinearCurve peel, BilinearCurve shear, double exponent, double contactStiffness)
        : base(peel, shear, contactStiffness)
    {
        _exponent = Admissible.Within(exponent, 0.1, 20, nameof(exponent));
    }

    /// <inheritdoc/>
    public override bool HasSymmetricTangent => PeelToughness == ShearToughness && PeelOnset == ShearOnset;

    /// <inheritdoc/>
    private protected override MixPoint At(double along, double across)
    {
        double mix = across * across, power = Math.Pow(mix, _exponent);
        return new MixPoint(mix, PeelOnset + (ShearOnset - PeelOnset) * power, PeelToughness + (ShearToughness - PeelToughness) * power, ShearOnset - PeelOnset, ShearToughness - PeelToughness,
            -2 * _exponent * power * along, mix > 0 ? 2 * _exponent * power / mix * (1 - mix) * across : 0);
    }
}
