using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Tests.Model;

/// <summary>
/// A straight bar of 40 mm × 4 mm and 1 mm width, without hardening, bent by equal and opposite moments or angles of its end faces, which stay plane. E = 200 GPa, Poisson's ratio 0.3,
/// yield 300 MPa: invented. Moments in N·mm, curvatures in 1/mm.
/// </summary>
internal static class BentBar
{
    public const double Young = 200000, Poisson = 0.3, Yield = 300, Length = 40, Height = 4;

    /// <summary>Moment at first yield, free out of plane.</summary>
    public const double ElasticMoment = Yield * Height * Height / 6;

    /// <summary>Moment with the whole section yielding, free out of plane.</summary>
    public const double PlasticMoment = Yield * Height * Height / 4;

    /// <summary>Curvature at first yield, free out of plane.</summary>
    public const double ElasticCurvature = 2 * Yield / (Young * Height);

    /// <summary>Curvature under a moment, free out of plane: M = M_p·[1 - (κ_e/κ)²/3].</summary>
    public static double Curvature(double moment) => ElasticCurvature / Math.Sqrt(3 * (1 - moment / PlasticMoment));

    /// <summary>Deck with stages that turn the ends.</summary>
    /// <param name="outOfPlane">held or free.</param>
    /// <param name="turns">Each "moment: 3 N*m" or "angle: 2 deg" of the right end, in order.</param>
    public static string Deck(string outOfPlane, params string[] turns)
    {
        string stages = string.Join("\n", turns.Select(turn => "  - turn: {grips: {left: -1, right: 1}, " + turn + "}"));
        return $$"""
        title: Bar bent beyond yield
        model: {width: 1 mm, out of plane: {{outOfPlane}}, rotation: small}
        materials:
          metal: {young: 200 GPa, poisson: 0.3, yield curve: {plastic strain: [0], stress: [300 MPa]} }
        adherends:
          bar: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [40 mm, 4 mm]}, elements: {along: 20, through: 24} }
        grips:
          left: {on: left end of bar}
          right: {on: right end of bar}
        sequence:
          - fix: {left: [x, y], right: [y]}
        {{stages}}
        keep: {curves of: [right], fields: every 1 points}
        """;
    }

    /// <summary>Curvature of the middle fifth: difference of the turns of two sections over their distance.</summary>
    public static double Curvature(Mesh mesh, FieldSnapshot fields)
    {
        MeshedAdherend bar = mesh.Adherends[0];
        return (Turn(0.6 * Length) - Turn(0.4 * Length)) / (0.2 * Length);

        double Turn(double x)
        {
            int top = bar.Edges["top"].Nodes[bar.Edges["top"].Nearest(x)], bottom = bar.Edges["bottom"].Nodes[bar.Edges["bottom"].Nearest(x)];
            return -(fields.DisplacementX[top] - fields.DisplacementX[bottom]) / Height;
        }
    }
}
