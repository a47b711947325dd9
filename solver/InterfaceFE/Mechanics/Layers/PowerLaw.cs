namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// One damage variable with toughness by the power law (Wu and Reuter 1965, from memory): (G_I/Γ_I)^α + (G_II/Γ_II)^α = 1 on proportional ways, so
/// G_c(B) = [((1 - B)/Γ_I)^α + (B/Γ_II)^α]^(-1/α). Onset by the same rule with Y_i = S_i²/(2·K_i) in place of Γ_i: with α = 1 that is the quadratic criterion of tractions, and for
/// every α the curve at each mix keeps a falling part, because Y_i is below Γ_i in both modes.
/// </summary>
/// <remarks>Variable of the rule is the angle θ with B = sin²θ: slopes stay finite at both pure modes down to α = ½, which is the least exponent.</remarks>
public sealed class PowerLaw : OneDamageLaw
{
    private readonly double _exponent;
    private readonly double _shearTough;
    private readonly double _shearBegin;

    /// <summary>Law from two bilinear curves and an exponent.</summary>
    /// <param name="peel">Curve of pure peel.</param>
    /// <param name="shear">Curve of pure shear.</param>
    /// <param name="exponent">α, from 0.5 to 20.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <exception cref="ArgumentNullException">A curve is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public PowerLaw(BilinearCurve peel, BilinearCurve shear, double exponent, double contactStiffness)
        : base(peel, shear, contactStiffness)
    {
        _exponent = Admissible.Within(exponent, 0.5, 20, nameof(exponent));
        // Relative to the peel values, so that no power of a toughness overflows.
        _shearTough = Math.Pow(PeelToughness / ShearToughness, _exponent);
        _shearBegin = Math.Pow(PeelOnset / ShearOnset, _exponent);
    }

    /// <inheritdoc/>
    public override bool HasSymmetricTangent => _exponent == 1 && PeelToughness == ShearToughness && PeelOnset == ShearOnset;

    /// <inheritdoc/>
    private protected override MixPoint At(double along, double across)
    {
        double mix = across * across, size = Math.Abs(across);
        double peelPart = Math.Pow(along, 2 * _exponent), shearPart = Math.Pow(size, 2 * _exponent);
        double peelTurn = -2 * _exponent * Math.Pow(along, 2 * _exponent - 1) * across, shearTurn = 2 * _exponent * Math.CopySign(Math.Pow(size, 2 * _exponent - 1), across) * along;
        double sum = peelPart + _shearTough * shearPart, begin = peelPart + _shearBegin * shearPart;
        double toughness = PeelToughness * Math.Pow(sum, -1 / _exponent), onset = PeelOnset * Math.Pow(begin, -1 / _exponent);
        return new MixPoint(mix, onset, toughness, -onset / (_exponent * begin) * (peelTurn + _shearBegin * shearTurn), -toughness / (_exponent * sum) * (peelTurn + _shearTough * shearTurn), -across, along);
    }
}
