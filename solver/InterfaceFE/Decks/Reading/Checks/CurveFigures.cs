namespace InterfaceFE.Decks.Reading.Checks;

/// <summary>The corner figures of a curve of traction against separation, as far as the checks need them; NaN where a figure is not known.</summary>
/// <param name="Stiffness">Initial stiffness [MPa/mm].</param>
/// <param name="Strength">Largest traction [MPa].</param>
/// <param name="Toughness">Area [N/mm].</param>
/// <param name="ElasticLimit">Separation up to which the curve is linear [mm].</param>
/// <param name="Peak">Separation at which the largest traction is first reached [mm].</param>
/// <param name="Final">Separation at which the traction is gone [mm].</param>
/// <param name="AreaToPeak">Area up to <paramref name="Peak"/> [N/mm].</param>
internal readonly record struct CurveFigures(double Stiffness, double Strength, double Toughness, double ElasticLimit, double Peak, double Final, double AreaToPeak)
{
    /// <summary>All unknown.</summary>
    public static CurveFigures Unknown { get; } = new(double.NaN, double.NaN, double.NaN, double.NaN, double.NaN, double.NaN, double.NaN);

    /// <summary>
    /// Criterion of the energy shares at this curve's strength in its pure mode, energy still due in the release branch included: [A(peak) + ½·strength·l]/toughness
    /// with the release length l as a share of the final separation.
    /// </summary>
    public double CriterionAtStrength(double releaseShare) => (AreaToPeak + 0.5 * Strength * releaseShare * Final) / Toughness;
}
