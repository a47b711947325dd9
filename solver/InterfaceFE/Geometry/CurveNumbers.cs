using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>
/// What the choice of an element length needs of a curve of traction against separation: strength [MPa], toughness [N/mm], stiffness [MPa/mm], elastic limit and final
/// separation [mm].
/// </summary>
/// <param name="Strength">Largest traction [MPa].</param>
/// <param name="Toughness">Area under the curve [N/mm].</param>
/// <param name="Stiffness">Initial stiffness [MPa/mm].</param>
/// <param name="ElasticLimit">Separation at the end of the first straight rise [mm].</param>
/// <param name="FinalSeparation">Separation at which the traction is gone [mm].</param>
public readonly record struct CurveNumbers(double Strength, double Toughness, double Stiffness, double ElasticLimit, double FinalSeparation)
{
    /// <summary>Numbers of the peel curve of a layer.</summary>
    /// <param name="name">Name of the layer, for errors.</param>
    /// <param name="layer">The layer.</param>
    /// <param name="held">Whether the model is held out of plane.</param>
    /// <exception cref="DeckException">When a value that the law needs is missing or the curve cannot be.</exception>
    public static CurveNumbers OfPeel(string name, LayerDeck layer, bool held) =>
        Of($"layers.{name}.peel", layer.Peel, layer.Peel.Opening, "opening", () => layer.Bulk is { } bulk ? PeelModulus(bulk, held) / layer.Thickness : null);

    /// <summary>Numbers of the shear curve of a layer.</summary>
    /// <param name="name">Name of the layer, for errors.</param>
    /// <param name="layer">The layer.</param>
    /// <exception cref="DeckException">When a value that the law needs is missing or the curve cannot be.</exception>
    public static CurveNumbers OfShear(string name, LayerDeck layer) =>
        Of($"layers.{name}.shear", layer.Shear, layer.Shear.Sliding, "sliding",
            () => layer.Bulk is { } bulk ? bulk.Young / (2 * (1 + bulk.Poisson)) / layer.Thickness : null);

    /// <summary>Modulus across a layer: confined E(1-ν)/((1+ν)(1-2ν)); unconfined E, or E/(1-ν²) when held out of plane. [MPa]</summary>
    private static double PeelModulus(BulkDeck bulk, bool held)
    {
        double nu = bulk.Poisson;
        if (bulk.BetweenFaces == Confinement.Confined)
            return bulk.Young * (1 - nu) / ((1 + nu) * (1 - 2 * nu));
        return held ? bulk.Young / (1 - nu * nu) : bulk.Young;
    }

    private static CurveNumbers Of(string path, CurveDeck curve, IReadOnlyList<double>? separations, string separationKey, Func<double?> bulkStiffness)
    {
        if (curve.Law == CurveShape.Table)
            return OfTable(path, curve, separations, separationKey);
        double strength = curve.Strength ?? throw Missing(path, "strength", curve);
        double toughness = curve.Toughness ?? throw Missing(path, "toughness", curve);
        if (curve.Law == CurveShape.Potential)
            return OfPotential(path, curve, strength, toughness);
        double stiffness = curve.Stiffness ?? bulkStiffness() ?? throw Missing(path, "stiffness", curve);
        double elastic = strength / stiffness;
        double final = curve.Law switch
        {
            CurveShape.Bilinear => 2 * toughness / strength,
            // Area strength/2·(final + plateau end - elastic limit); without a plateau end that end is two thirds of the final separation.
            CurveShape.Trapezoid when curve.PlateauUntil is { } plateau => 2 * toughness / strength - plateau + elastic,
            CurveShape.Trapezoid => 0.6 * (2 * toughness / strength + elastic),
            // Area of the rise and of the parabola with its top at the strength: strength·elastic limit/2 + 2/3·strength·(final - elastic limit).
            CurveShape.LinearParabolic => 1.5 * toughness / strength + 0.25 * elastic,
            _ => curve.FinalSeparation ?? throw Missing(path, "final separation", curve),
        };
        if (!(final > elastic) || !double.IsFinite(final))
            throw new DeckException(path, Text.Of($"the final separation, {final:G4} mm, must lie beyond the elastic limit, {elastic:G4} mm (strength over stiffness): raise stiffness or toughness, or lower the strength"));
        return new CurveNumbers(strength, toughness, stiffness, elastic, final);
    }

    private static CurveNumbers OfPotential(string path, CurveDeck curve, double strength, double toughness)
    {
        double exponent = curve.Exponent ?? throw Missing(path, "exponent", curve);
        PotentialFigures figures = PotentialFigures.Of(strength, toughness, exponent, curve.InitialSlope ?? throw Missing(path, "initial slope", curve));
        return new CurveNumbers(strength, toughness, figures.Stiffness, strength / figures.Stiffness, figures.Final);
    }

    private static CurveNumbers OfTable(string path, CurveDeck curve, IReadOnlyList<double>? separations, string separationKey)
    {
        if (separations == null)
            throw Missing(path, separationKey, curve);
        IReadOnlyList<double> tractions = curve.Traction ?? throw Missing(path, "traction", curve);
        if (separations.Count != tractions.Count || separations.Count < 3)
            throw new DeckException($"{path}.traction", $"a table needs as many tractions as separations, three at least; there are {tractions.Count} and {separations.Count}");
        double area = 0;
        double strength = 0;
        for (int i = 1; i < separations.Count; i++)
        {
            if (!(separations[i] > separations[i - 1]))
                throw new DeckException($"{path}.{separationKey}", Text.Of($"separations must rise: {separations[i]:G6} mm follows {separations[i - 1]:G6} mm"));
            area += (separations[i] - separations[i - 1]) * (tractions[i] + tractions[i - 1]) / 2;
            strength = Math.Max(strength, tractions[i]);
        }
        if (!(tractions[1] > 0))
            throw new DeckException($"{path}.traction", "the second traction must be greater than 0 MPa: a curve starts with an elastic rise");
        return new CurveNumbers(strength, area, tractions[1] / separations[1], separations[1], separations[^1]);
    }

    private static DeckException Missing(string path, string key, CurveDeck curve) =>
        new(path, $"`{key}` is missing; the law `{curve.Law.ToString().ToLowerInvariant()}` needs it");
}
