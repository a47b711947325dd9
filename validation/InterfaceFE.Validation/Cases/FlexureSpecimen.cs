using InterfaceFE.Decks;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// End-notched flexure: two equal arms bonded over their length but for a starter crack at the left, on two support pins under the lower face, pushed down by a pin in the middle of
/// the upper face. Pins are single points; the specimen overhangs them so that the slope there can be read. Lengths in mm, moduli and strengths in MPa, toughnesses in N/mm.
/// </summary>
public sealed record FlexureSpecimen
{
    /// <summary>What sticks out beyond each support pin.</summary>
    public const double Overhang = 10;

    /// <summary>Stiffness of the layer and of its faces in contact [MPa/mm].</summary>
    public const double LayerStiffness = 1e6;

    /// <summary>Name.</summary>
    public required string Name { get; init; }

    /// <summary>Moduli and Poisson's ratios of the arms, as a deck writes them.</summary>
    public required string Material { get; init; }

    /// <summary>Young's modulus along the arms.</summary>
    public required double Young { get; init; }

    /// <summary>E' = E₁/(1 - ν₁₃ν₃₁), held out of plane.</summary>
    public required double HeldYoung { get; init; }

    /// <summary>Width.</summary>
    public required double Width { get; init; }

    /// <summary>Height of one arm.</summary>
    public required double Height { get; init; }

    /// <summary>Half of the span.</summary>
    public required double HalfSpan { get; init; }

    /// <summary>Toughness of pure peel.</summary>
    public required double PeelToughness { get; init; }

    /// <summary>Toughness of pure shear.</summary>
    public required double ShearToughness { get; init; }

    /// <summary>Peel strength.</summary>
    public required double PeelStrength { get; init; }

    /// <summary>Exponent of Benzeggagh and Kenane.</summary>
    public required double Exponent { get; init; }

    /// <summary>Root term Y of the exact energy release rate G = 9P²(a + Y·h)²/(16·E'·b²·h³).</summary>
    public required double RootTerm { get; init; }

    /// <summary>AS4/PEEK of Camanho and Dávila.</summary>
    public static FlexureSpecimen As4Peek { get; } = new()
    {
        Name = "AS4/PEEK",
        Material = "{young: {x: 122.7 GPa, y: 10.1 GPa, z: 10.1 GPa}, poisson: {xy: 0.25, xz: 0.25, zy: 0.45}, shear modulus: {xy: 5.5 GPa}}",
        Young = 122700,
        HeldYoung = 122700 / (1 - 0.25 * 0.25 * 10.1 / 122.7),
        Width = 25.4,
        Height = 1.56,
        HalfSpan = 51,
        PeelToughness = 0.969,
        ShearToughness = 1.719,
        PeelStrength = 80,
        Exponent = 2.284,
        RootTerm = 0.620,
    };

    /// <summary>IM7/8552 of Krueger.</summary>
    public static FlexureSpecimen Im7 { get; } = new()
    {
        Name = "IM7/8552",
        Material = "{young: {x: 161 GPa, y: 11.38 GPa, z: 11.38 GPa}, poisson: {xy: 0.32, xz: 0.32, zy: 0.45}, shear modulus: {xy: 5.17 GPa}}",
        Young = 161000,
        HeldYoung = 161000 / (1 - 0.32 * 0.32 * 11.38 / 161),
        Width = 25.4,
        Height = 2.25,
        HalfSpan = 50.8,
        PeelToughness = 0.212,
        ShearToughness = 0.774,
        PeelStrength = 60,
        Exponent = 2.1,
        RootTerm = 0.730,
    };

    /// <summary>Deflection under the pin at load P with a crack of length a: simple beams, P(3a³ + 2L³)/(8Ebh³), a ≤ L.</summary>
    public double BeamDeflection(double load, double crack) =>
        load * (3 * crack * crack * crack + 2 * HalfSpan * HalfSpan * HalfSpan) / (8 * Young * Width * Height * Height * Height);

    /// <summary>Load at which a crack of length a ≤ L grows in a linear-elastic body, held out of plane: P = 4bh^1.5·√(E'Γ)/(3(a + Y·h)).</summary>
    public double CriticalLoad(double crack) => 4 * Width * Math.Pow(Height, 1.5) * Math.Sqrt(HeldYoung * ShearToughness) / (3 * (crack + RootTerm * Height));

    /// <summary>The deck.</summary>
    /// <param name="crack">Crack length from the support pin.</param>
    /// <param name="strength">Shear strength.</param>
    /// <param name="mixing">How the modes mix.</param>
    /// <param name="travel">Travel of the pin.</param>
    /// <param name="mostPoints">Points after which the run may stop, once the peak is past.</param>
    /// <param name="elementLength">Element length along the joint; null: the default.</param>
    public string Deck(double crack, double strength, Mixing mixing, double travel, int mostPoints = 2000, double? elementLength = null)
    {
        double length = 2 * (HalfSpan + Overhang);
        string mixed = mixing == Mixing.BenzeggaghKenane ? $"mixing: benzeggagh-kenane, exponent: {Exponent}" : "mixing: independent modes";
        string elements = elementLength is { } along ? $", element length: {along} mm" : "";
        return $$$"""
            title: End-notched flexure, {{{Name}}}
            model: {width: {{{Width}}} mm, out of plane: held, rotation: small}
            materials:
              arm: {{{Material}}}
            layers:
              matrix:
                {thickness: 0.01 mm, contact stiffness: {{{LayerStiffness}}} MPa/mm, {{{mixed}}},
                 peel: {law: bilinear, stiffness: {{{LayerStiffness}}} MPa/mm, strength: {{{PeelStrength}}} MPa, toughness: {{{PeelToughness}}} N/mm},
                 shear: {law: bilinear, stiffness: {{{LayerStiffness}}} MPa/mm, strength: {{{strength}}} MPa, toughness: {{{ShearToughness}}} N/mm}}
            adherends:
              lower arm: {of: arm, rectangle: {corner: [0 mm, 0 mm], size: [{{{length}}} mm, {{{Height}}} mm]}}
              upper arm: {of: arm, rectangle: {corner: [0 mm, {{{Height}}} mm], size: [{{{length}}} mm, {{{Height}}} mm]}}
            joints:
              bond: {layer: matrix, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: {{{Overhang + crack}}} mm}{{{elements}}}}
            grips:
              left support: {on: bottom of lower arm, at: {{{Overhang}}} mm}
              right support: {on: bottom of lower arm, at: {{{length - Overhang}}} mm}
              pin: {on: top of upper arm, at: {{{Overhang + HalfSpan}}} mm}
            sequence:
              - fix: {left support: [x, y], right support: [y]}
              - push: {grip: pin, along: -y, travel: {{{travel}}} mm}
            keep: {curves of: [pin], fields: none}
            march: {most points: {{{mostPoints}}}}
            """;
    }
}
