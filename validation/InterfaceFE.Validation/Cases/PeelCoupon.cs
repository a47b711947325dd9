namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Double cantilever beam: two equal arms bonded over their length but for a starter crack at the left, pulled apart at their end faces. Each end face is one rigid plane with its pin at
/// mid-height, free to turn, so that crack length counts from x = 0. Lengths in mm, moduli and strengths in MPa, toughnesses in N/mm.
/// </summary>
public sealed record PeelCoupon
{
    /// <summary>Name.</summary>
    public required string Name { get; init; }

    /// <summary>Moduli and Poisson's ratios of the arms, as a deck writes them.</summary>
    public required string Material { get; init; }

    /// <summary>Young's modulus along the arms.</summary>
    public required double Young { get; init; }

    /// <summary>State out of plane: held or free.</summary>
    public required string OutOfPlane { get; init; }

    /// <summary>Length of the specimen.</summary>
    public required double Length { get; init; }

    /// <summary>Width.</summary>
    public required double Width { get; init; }

    /// <summary>Height of one arm.</summary>
    public required double Height { get; init; }

    /// <summary>Length of the starter crack from the load line.</summary>
    public required double Crack { get; init; }

    /// <summary>Stiffness of the layer in peel and shear [MPa/mm].</summary>
    public required double LayerStiffness { get; init; }

    /// <summary>Peel strength.</summary>
    public required double Strength { get; init; }

    /// <summary>Toughness of pure peel.</summary>
    public required double Toughness { get; init; }

    /// <summary>Epoxy on steel arms, free out of plane: the layer of the demo's peel coupon in peel; in shear the same curve, which plays no part. All numbers invented for the demo.</summary>
    public static PeelCoupon Epoxy { get; } = new()
    {
        Name = "epoxy on steel",
        Material = "{young: 210 GPa, poisson: 0.3}",
        Young = 210000,
        OutOfPlane = "free",
        Length = 160,
        Width = 25,
        Height = 6,
        Crack = 50,
        LayerStiffness = 12000,
        Strength = 38,
        Toughness = 0.6,
    };

    /// <summary>Carbon/epoxy of Alfano and Crisfield, Int. J. Numer. Meth. Eng. 50 (2001) 1701-1736, Table I (data from memory) at their highest strength; layer stiffness the project's choice.</summary>
    public static PeelCoupon AlfanoCrisfield { get; } = new()
    {
        Name = "Alfano and Crisfield",
        Material = "{young: {x: 135.3 GPa, y: 9 GPa, z: 9 GPa}, poisson: {xy: 0.24, xz: 0.24, zy: 0.46}, shear modulus: {xy: 5.2 GPa}}",
        Young = 135300,
        OutOfPlane = "held",
        Length = 100,
        Width = 20,
        Height = 1.5,
        Crack = 30,
        LayerStiffness = 1e6,
        Strength = 57,
        Toughness = 0.28,
    };

    /// <summary>The deck.</summary>
    /// <param name="travel">Opening of the pins at the end [mm].</param>
    /// <param name="elementLength">Element length along the joint [mm]; null: the default.</param>
    /// <param name="march">Settings of the march, as a deck writes them; null: the defaults.</param>
    /// <param name="loadTrain">Stiffness of a load train at the upper end [N/mm]; null: none.</param>
    public string Deck(double travel, double? elementLength = null, string? march = null, double? loadTrain = null)
    {
        string curve = $"{{law: bilinear, stiffness: {LayerStiffness} MPa/mm, strength: {Strength} MPa, toughness: {Toughness} N/mm}}";
        string elements = elementLength is { } length ? $", element length: {length} mm" : "";
        string train = loadTrain is { } stiffness ? FormattableString.Invariant($", load train: {{stiffness: {stiffness:R} N/mm}}") : "";
        return $$"""
            title: Double cantilever beam, {{Name}}
            model: {width: {{Width}} mm, out of plane: {{OutOfPlane}}, rotation: small}
            materials:
              arm: {{Material}}
            layers:
              bond: {thickness: 0.25 mm, mixing: independent modes, peel: {{curve}}, shear: {{curve}} }
            adherends:
              lower arm: {of: arm, rectangle: {corner: [0 mm, 0 mm], size: [{{Length}} mm, {{Height}} mm]} }
              upper arm: {of: arm, rectangle: {corner: [0 mm, {{Height}} mm], size: [{{Length}} mm, {{Height}} mm]} }
            joints:
              bond: {layer: bond, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: {{Crack}} mm}{{elements}} }
            grips:
              upper end: {on: left end of upper arm{{train}} }
              lower end: {on: left end of lower arm}
            sequence:
              - fix: {lower end: [x, y], upper end: [x]}
              - pull: {grip: upper end, along: +y, travel: {{travel}} mm}
            keep: {curves of: [upper end], fields: none}
            {{(march is null ? "" : "march: " + march)}}
            """;
    }
}
