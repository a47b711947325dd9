using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class CrackTipModulusTests
{
    /// <summary>AS4/PEEK, data of Camanho and Dávila 2002 (transverse moduli from memory).</summary>
    private static readonly MaterialDeck Peek = new()
    {
        Young = new Directional(122700, 10100, 10100),
        Poisson = new PoissonRatios(0.25, 0.25, 0.45),
        ShearModulus = new ShearModuli { Xy = 5500 },
    };

    [Theory]
    [InlineData(false, 210e3)]
    [InlineData(true, 210e3 / 0.91)]
    public void An_isotropic_material_written_by_direction_has_its_plane_modulus_in_both_modes(bool held, double expected)
    {
        MaterialDeck steel = new() { Young = new Directional(210e3), Poisson = new PoissonRatios(0.3), ShearModulus = new ShearModuli { Xy = 210e3 / 2.6 } };
        CrackTipModulus tip = CrackTipModulus.Of(steel, held)!.Value;
        Close.To(expected, tip.Peel, 1e-12, 0, "peel");
        Close.To(expected, tip.Shear, 1e-12, 0, "shear");
    }

    [Fact]
    public void A_fibre_reinforced_arm_is_softer_at_a_crack_tip_than_along_it()
    {
        // By hand, free out of plane: q² = √(122700/10100) + 122700/11000 - 0.25 = 14.3900, 1/E*_II = q/(√2·122700), 1/E*_I = q/√(2·122700·10100).
        CrackTipModulus tip = CrackTipModulus.Of(Peek, held: false)!.Value;
        double q = Math.Sqrt(Math.Sqrt(122700.0 / 10100) + 122700.0 / 11000 - 0.25);
        Close.To(Math.Sqrt(2) * 122700 / q, tip.Shear, 1e-12, 0, "shear");
        Close.To(Math.Sqrt(2 * 122700.0 * 10100) / q, tip.Peel, 1e-12, 0, "peel");
        Assert.True(tip.Shear < 122700 / 2.5 && tip.Peel < tip.Shear);
    }

    [Fact]
    public void Isotropic_numbers_leave_the_plane_modulus() => Assert.Null(CrackTipModulus.Of(Steel, held: true));

    [Fact]
    public void A_softer_tip_shortens_the_zone_and_only_where_the_zone_is_short_against_the_arm()
    {
        Arm stiff = new(122700, 1.56, 20);
        double softTip = CrackTipModulus.Of(Peek, held: true)!.Value.Shear;
        // Zones of the flexure coupon of AS4/PEEK at 1e6 MPa/mm, as its runs show them (starter crack 39.3 mm): 3.2 mm at 100 MPa, 0.36 mm at 400 MPa.
        CurveNumbers weak = new(100, 1.719, 1e6, 1e-4, 2 * 1.719 / 100), strong = new(400, 1.719, 1e6, 4e-4, 2 * 1.719 / 400);
        Close.To(3.2, JointLength.ProcessZone(weak, false, stiff.Modulus, stiff.Thickness, 1, softTip), 0.25, 0, "zone at 100 MPa");
        Close.To(0.36, JointLength.ProcessZone(strong, false, stiff.Modulus, stiff.Thickness, 1, softTip), 0.25, 0, "zone at 400 MPa");
        Assert.True(JointLength.ProcessZone(strong, false, stiff.Modulus, stiff.Thickness, 1) > 1.8 * JointLength.ProcessZone(strong, false, stiff.Modulus, stiff.Thickness, 1, softTip));
        CurveNumbers tape = new(0.5, 2, 2.5, 0.2, 5);
        Close.To(1, JointLength.ProcessZone(tape, false, stiff.Modulus, stiff.Thickness, 1, softTip) / JointLength.ProcessZone(tape, false, stiff.Modulus, stiff.Thickness, 1), 0.05, 0, "zone of a tape");
    }

    [Theory]
    [InlineData(ElementKind.EightNode, 1.0)]
    [InlineData(ElementKind.FourNode, 0.5)]
    public void Rows_at_a_bonded_face_are_no_higher_than_the_process_zone(ElementKind kind, double share)
    {
        LayerDeck sharp = Layer(CurveShape.Bilinear, 1e6, 300, 0.3, 0.2);
        Deck deck = Deck(new() { ["a"] = Rectangle(0, 0, 20, 6), ["b"] = Rectangle(0, 6, 20, 6) }, new() { ["j"] = Joint("bottom of b", "top of a", length: 0.1) }, sharp, kind);
        Mesh mesh = MeshFacts.Check(deck).Mesh;
        double zone = mesh.Joints[0].ProcessZoneEstimate;
        Assert.True(zone < 1);
        foreach (MeshedAdherend adherend in mesh.Adherends)
        {
            double[] heights = Heights(mesh, adherend);
            if (adherend.Name == "a")
                Array.Reverse(heights);
            Assert.True(heights[0] <= share * zone, $"{heights[0]} mm at the bond, zone {zone} mm");
            for (int i = 1; i < heights.Length; i++)
                Assert.InRange(heights[i] / heights[i - 1], 1 - 1e-9, 2 + 1e-9);
        }
    }

    /// <summary>Heights of the rows, from below.</summary>
    private static double[] Heights(Mesh mesh, MeshedAdherend adherend)
    {
        MeshedEdge end = adherend.Edges["left end"];
        int step = mesh.NodesPerFace - 1;
        return [.. Enumerable.Range(0, adherend.ElementsThrough).Select(i => mesh.Y[end.Nodes[(i + 1) * step]] - mesh.Y[end.Nodes[i * step]])];
    }
}
