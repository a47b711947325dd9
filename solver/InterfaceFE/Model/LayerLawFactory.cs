using InterfaceFE.Decks;
using InterfaceFE.Mechanics.Layers;

namespace InterfaceFE.Model;

/// <summary>Layers of a deck as cohesive laws.</summary>
public static class LayerLawFactory
{
    /// <summary>The law of a layer.</summary>
    /// <param name="name">Name of the layer.</param>
    /// <param name="layer">The layer.</param>
    /// <param name="outOfPlane">State out of plane.</param>
    /// <param name="ambientPressure">Ambient pressure of the run [MPa]; null: that of the layer's test.</param>
    /// <exception cref="DeckException">The numbers do not make a law.</exception>
    public static ILayerLaw Create(string name, LayerDeck layer, OutOfPlane outOfPlane, double? ambientPressure)
    {
        ILayerLaw law = WithoutRelaxation(name, layer, outOfPlane, ambientPressure);
        if (layer.Relaxation is not { } relaxation)
            return law;
        string path = $"layers.{name}.relaxation";
        try
        {
            return new RelaxingLaw(law, [.. relaxation.Share], [.. relaxation.Time], relaxation.Shift switch
            {
                ShiftLaw.Wlf => TimeShift.Wlf(Value(relaxation.Reference, "reference"), Value(relaxation.C1, "c1"), Value(relaxation.C2, "c2")),
                ShiftLaw.Arrhenius => TimeShift.Arrhenius(Value(relaxation.Reference, "reference"), Value(relaxation.Activation, "activation")),
                _ => TimeShift.None,
            });
        }
        catch (ArgumentException fault)
        {
            throw new DeckException(path, fault.Message);
        }

        double Value(double? value, string key) => value ?? throw new DeckException($"{path}.{key}", "is needed by this shift");
    }

    private static ILayerLaw WithoutRelaxation(string name, LayerDeck layer, OutOfPlane outOfPlane, double? ambientPressure)
    {
        if (layer.Mixing == Mixing.CoupledPotential)
            return Potential(name, layer);
        ConfinedStiffness? bulk = Bulk(layer, outOfPlane);
        ITractionCurve peel = UnderPressure(name, layer, Curve(layer.Peel, layer.Peel.Opening, bulk?.Peel, $"layers.{name}.peel"), ambientPressure);
        ITractionCurve shear = Curve(layer.Shear, layer.Shear.Sliding, bulk?.Shear, $"layers.{name}.shear");
        double contact = layer.ContactStiffness ?? peel.Stiffness;
        try
        {
            return layer.Mixing switch
            {
                Mixing.BenzeggaghKenane => new BenzeggaghKenaneLaw((BilinearCurve)peel, (BilinearCurve)shear, Exponent(name, layer), contact),
                Mixing.PowerLaw => new PowerLaw((BilinearCurve)peel, (BilinearCurve)shear, Exponent(name, layer), contact),
                _ => new IndependentModesLaw(peel, shear, contact, layer.ReleaseLength, layer.CountedBy == EnergyCount.NetWork ? EnergyCounting.NetWork : EnergyCounting.LargestSeparation,
                    layer.Peel.PlasticShare ?? 0, layer.Shear.PlasticShare ?? 0),
            };
        }
        catch (ArgumentException fault)
        {
            throw new DeckException($"layers.{name}", fault.Message);
        }
    }

    private static ITractionCurve UnderPressure(string name, LayerDeck layer, ITractionCurve peel, double? ambientPressure)
    {
        if (layer.Cavities is not { } cavities || ambientPressure is not { } pressure)
            return peel;
        double measured = layer.MeasuredAt?.Pressure ?? throw new DeckException($"layers.{name}.measured at.pressure", "is needed with `cavities`");
        try
        {
            return new CavityCurve(peel, [.. cavities.Opening], [.. cavities.Share], pressure - measured);
        }
        catch (ArgumentException fault)
        {
            throw new DeckException($"layers.{name}.cavities", fault.Message);
        }
    }

    private static CoupledPotentialLaw Potential(string name, LayerDeck layer)
    {
        PotentialMode peel = Mode(layer.Peel, $"layers.{name}.peel");
        return new CoupledPotentialLaw(peel, Mode(layer.Shear, $"layers.{name}.shear"), layer.ContactStiffness ?? peel.Stiffness);

        static PotentialMode Mode(CurveDeck curve, string path)
        {
            try
            {
                return new PotentialMode(Value(curve.Strength, "strength"), Value(curve.Toughness, "toughness"), Value(curve.Exponent, "exponent"), Value(curve.InitialSlope, "initial slope"));
            }
            catch (ArgumentException fault)
            {
                throw new DeckException(path, fault.Message);
            }

            double Value(double? value, string key) => value ?? throw new DeckException($"{path}.{key}", "is needed by the law potential");
        }
    }

    private static double Exponent(string name, LayerDeck layer) => layer.Exponent ?? throw new DeckException($"layers.{name}.exponent", "is needed with this mixing");

    /// <summary>Stiffness and free opening of a layer from its bulk properties; null when none are given.</summary>
    public static ConfinedStiffness? Bulk(LayerDeck layer, OutOfPlane outOfPlane)
    {
        if (layer.Bulk is not { } bulk)
            return null;
        LayerRestraint restraint = bulk.BetweenFaces == Confinement.Confined ? LayerRestraint.Confined
            : outOfPlane == OutOfPlane.Free ? LayerRestraint.UnconfinedFree : LayerRestraint.UnconfinedHeld;
        return new ConfinedStiffness(bulk.Young, bulk.Poisson, bulk.Expansion, layer.Thickness, restraint);
    }

    private static ITractionCurve Curve(CurveDeck curve, IReadOnlyList<double>? separations, double? bulkStiffness, string path)
    {
        try
        {
            if (curve.Law == CurveShape.Table)
                return new TableCurve([.. separations ?? []], [.. curve.Traction ?? []]);
            double stiffness = curve.Stiffness ?? bulkStiffness ?? throw new DeckException($"{path}.stiffness", "is needed, or `bulk` properties of the layer");
            double strength = curve.Strength ?? throw new DeckException($"{path}.strength", "is needed");
            double toughness = curve.Toughness ?? throw new DeckException($"{path}.toughness", "is needed");
            return curve.Law switch
            {
                CurveShape.Bilinear => new BilinearCurve(stiffness, strength, toughness),
                CurveShape.Trapezoid => new TrapezoidCurve(stiffness, strength, toughness, curve.PlateauUntil ?? double.NaN, curve.FinalSeparation ?? double.NaN),
                CurveShape.LinearParabolic => new LinearParabolicCurve(stiffness, strength, toughness),
                _ => new ExponentialCurve(stiffness, strength, toughness, curve.FinalSeparation ?? throw new DeckException($"{path}.final separation", "is needed by an exponential curve")),
            };
        }
        catch (ArgumentException fault)
        {
            throw new DeckException(path, fault.Message);
        }
    }
}
