using InterfaceFE.Geometry;
using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Strips of steel and aluminium, 1 mm thick each, bonded by an elastic layer over their whole length, on one pin and one roller at the ends of the lowest face, heated by 100 K: the
/// example worked out in the project's notes (steel 210 GPa, 0.30, 12e-6 1/K; aluminium 70 GPa, 0.33, 23e-6 1/K). Lengths in mm, stiffnesses in MPa/mm.
/// </summary>
/// <param name="OutOfPlane">held, free or uniform strain.</param>
/// <param name="HalfLength">Half of the length.</param>
/// <param name="ShearStiffness">Shear stiffness of the layer.</param>
/// <param name="PeelStiffness">Peel stiffness of the layer.</param>
public sealed record ThermalStrip(string OutOfPlane, double HalfLength, double ShearStiffness, double PeelStiffness)
{
    /// <summary>Heating [K].</summary>
    public const double Heating = 100;

    private bool IsFree => OutOfPlane == "free";

    private double Steel => IsFree ? 210000 : 210000 / (1 - 0.09);

    private double Aluminium => IsFree ? 70000 : 70000 / (1 - 0.33 * 0.33);

    /// <summary>Difference of the free strains along x; held out of plane each expands by (1 + ν)·α, and a strain e out of plane takes ν·e off.</summary>
    /// <param name="compliance">Compliance λ that shear in the layer works against [mm/N].</param>
    public double Mismatch(double compliance) => IsFree ? Heating * (23e-6 - 12e-6) : Heating * (1.33 * 23e-6 - 1.3 * 12e-6) - 0.03 * StrainOutOfPlane(compliance);

    /// <summary>
    /// Strain e out of plane; 0 when held. With a uniform strain no force acts out of plane: with σzz = ν·σx + E(e - α·ΔT) and the force N = mismatch/λ that shear carries from one
    /// strip into the other, in the mean over the length times f = 1 - tanh(ωL)/(ωL), (ν_s - ν_a)·f·N + t[E_s(e - α_s·ΔT) + E_a(e - α_a·ΔT)] = 0; t = 1 mm.
    /// </summary>
    /// <param name="compliance">Compliance λ that shear in the layer works against [mm/N].</param>
    public double StrainOutOfPlane(double compliance)
    {
        if (OutOfPlane == "held")
            return 0;
        double reach = Math.Sqrt(ShearStiffness * compliance) * HalfLength, carried = (1 - Math.Tanh(reach) / reach) / compliance;
        double held = Heating * (1.33 * 23e-6 - 1.3 * 12e-6);
        return (Heating * (210000 * 12e-6 + 70000 * 23e-6) + 0.03 * carried * held) / (210000 + 70000 + 0.03 * 0.03 * carried);
    }

    /// <summary>
    /// Sum of the compliances that shear in the layer works against when the strip may bend, λ = 1/E₁t₁ + 1/E₂t₂ + (t₁ + t₂)²/(4(D₁ + D₂)) [mm/N]; t = 1 mm.
    /// </summary>
    public double BendingCompliance => 1 / Steel + 1 / Aluminium + 4 / (4 * (Steel + Aluminium) / 12);

    /// <summary>The same without bending, 1/E₁t₁ + 1/E₂t₂ [mm/N].</summary>
    public double StretchCompliance => 1 / Steel + 1 / Aluminium;

    /// <summary>Timoshenko's curvature, J. Opt. Soc. Am. 11 (1925) 233-255, in the form (t₁ + t₂)·mismatch/(2(D₁ + D₂)·λ) [1/mm].</summary>
    public double Timoshenko => 2 * Mismatch(BendingCompliance) / (2 * (Steel + Aluminium) / 12 * BendingCompliance);

    /// <summary>Deck of two layers, aluminium on steel.</summary>
    public string TwoLayers() => $$"""
        {{Heading("Two-layer strip, heated", onlyStretch: false)}}
        adherends:
          steel strip: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [{{2 * HalfLength}} mm, 1 mm]} }
          aluminium strip: {of: aluminium, rectangle: {corner: [0 mm, 1 mm], size: [{{2 * HalfLength}} mm, 1 mm]} }
        joints:
          bond: {layer: bond, upper: bottom of aluminium strip, lower: top of steel strip}
        grips:
          left foot: {on: bottom of steel strip, at: start}
          right foot: {on: bottom of steel strip, at: end}
        {{Ending()}}
        """;

    /// <summary>Deck of three layers, aluminium of 2 mm between two strips of steel.</summary>
    /// <param name="onlyStretch">Whether the strips shall stretch along x only, as in shear-lag theory: next to rigid in shear and across, with no contraction in the plane.</param>
    public string ThreeLayers(bool onlyStretch) => $$"""
        {{Heading("Three-layer strip, heated", onlyStretch)}}
        adherends:
          lower strip: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [{{2 * HalfLength}} mm, 1 mm]} }
          core: {of: aluminium, rectangle: {corner: [0 mm, 1 mm], size: [{{2 * HalfLength}} mm, 2 mm]} }
          upper strip: {of: steel, rectangle: {corner: [0 mm, 3 mm], size: [{{2 * HalfLength}} mm, 1 mm]} }
        joints:
          lower bond: {layer: bond, upper: bottom of core, lower: top of lower strip}
          upper bond: {layer: bond, upper: bottom of upper strip, lower: top of core}
        grips:
          left foot: {on: bottom of lower strip, at: start}
          right foot: {on: bottom of lower strip, at: end}
        {{Ending()}}
        """;

    /// <summary>Curvature at mid-length [1/mm]: parabola through the deflections of the lowest face within a twentieth of the length from the middle, by least squares.</summary>
    public double Curvature(RunResult run, string lowest)
    {
        ArgumentNullException.ThrowIfNull(run);
        FieldSnapshot fields = run.History.Snapshots[^1];
        MeshedEdge edge = run.History.Mesh.Adherends.First(a => a.Name == lowest).Edges["bottom"];
        double s0 = 0, s2 = 0, s4 = 0, y0 = 0, y2 = 0;
        // The odd part drops out over a span that is even about the middle, so v = c₀ + c₂·x² is fitted.
        for (int i = 0; i < edge.Nodes.Length; i++)
        {
            double x = edge.Arc[i] - HalfLength;
            if (Math.Abs(x) > HalfLength / 10)
                continue;
            double v = fields.DisplacementY[edge.Nodes[i]];
            s0++;
            s2 += x * x;
            s4 += x * x * x * x;
            y0 += v;
            y2 += v * x * x;
        }
        return 2 * (s0 * y2 - s2 * y0) / (s0 * s4 - s2 * s2);
    }

    /// <summary>Sliding at the right end of a joint [mm].</summary>
    public static double EndSliding(RunResult run, int joint)
    {
        ArgumentNullException.ThrowIfNull(run);
        return run.History.Snapshots[^1].Layers[joint].Sliding[^1];
    }

    private string Heading(string title, bool onlyStretch) => $$"""
        title: {{title}}
        model: {width: 10 mm, out of plane: {{OutOfPlane}}, rotation: small}
        materials:
          steel: {{Metal(210, 0.3, 12, onlyStretch)}}
          aluminium: {{Metal(70, 0.33, 23, onlyStretch)}}
        layers:
          bond: {thickness: 0.2 mm, mixing: independent modes, peel: {{Elastic(PeelStiffness)}}, shear: {{Elastic(ShearStiffness)}} }
        """;

    private static string Ending() => """
        stress-free temperature: 20 °C
        sequence:
          - fix: {left foot: [x, y], right foot: [y]}
          - heat to: 120 °C
        keep: {fields: every 1 points}
        """;

    private static string Metal(double young, double poisson, double expansion, bool onlyStretch) => onlyStretch
        ? $"{{young: {{x: {young} GPa, y: 1e5 GPa, z: {young} GPa}}, poisson: {{xy: 0, xz: {poisson}, zy: 0}}, shear modulus: {{xy: 1e4 GPa}}, expansion: {{x: {expansion}e-6 1/K, y: 0 1/K, z: {expansion}e-6 1/K}}}}"
        : $"{{young: {young} GPa, poisson: {poisson}, expansion: {expansion}e-6 1/K}}";

    /// <summary>A curve whose elastic limit, at a separation of 1 mm, is far beyond what the strips reach, so tough that no process zone asks for short elements.</summary>
    private static string Elastic(double stiffness) => $"{{law: bilinear, stiffness: {stiffness} MPa/mm, strength: {stiffness} MPa, toughness: {1000 * stiffness} N/mm}}";
}
