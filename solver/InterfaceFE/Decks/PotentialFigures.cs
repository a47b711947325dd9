namespace InterfaceFE.Decks;

/// <summary>
/// Figures of a mode of the coupled potential of Park, Paulino and Roesler 2009 (formulas from memory): α exponent, λ initial slope indicator, m = α(α - 1)λ²/(1 - αλ²), c = α/m.
/// </summary>
/// <param name="Stiffness">Initial stiffness toughness·α(1 + c)/final² [MPa/mm].</param>
/// <param name="Final">Final separation toughness/strength·α(1 + c)·λ(1 - λ)^(α-1)(1 + cλ)^(m-1) [mm].</param>
/// <param name="AreaToPeak">Area of the mode alone up to its strength [N/mm].</param>
internal readonly record struct PotentialFigures(double Stiffness, double Final, double AreaToPeak)
{
    /// <summary>Largest initial slope indicator of an exponent, 1/√(2α - 1): above it traction over separation would rise at first.</summary>
    public static double LargestInitialSlope(double exponent) => 1 / Math.Sqrt(2 * exponent - 1);

    /// <summary>Figures from strength [MPa], toughness [N/mm], exponent and initial slope indicator.</summary>
    public static PotentialFigures Of(double strength, double toughness, double exponent, double initialSlope)
    {
        double left = 1 - exponent * initialSlope * initialSlope, shape = exponent * (exponent - 1) * initialSlope * initialSlope / left, rise = exponent / shape;
        double steepness = exponent * (1 + rise), at = 1 + rise * initialSlope;
        double final = toughness / strength * steepness * initialSlope * Math.Pow(1 - initialSlope, exponent - 1) * Math.Pow(at, shape - 1);
        return new PotentialFigures(toughness * steepness / (final * final), final, toughness * (1 - Math.Pow(1 - initialSlope, exponent) * Math.Pow(at, shape)));
    }
}
