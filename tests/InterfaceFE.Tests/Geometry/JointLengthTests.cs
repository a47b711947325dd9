using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class JointLengthTests
{
    private static LayerDeck Of(CurveDeck curve, BulkDeck? bulk = null) => new() { Thickness = 0.5, Peel = curve, Shear = curve, Mixing = Mixing.IndependentModes, Bulk = bulk };

    /// <summary>Area under straight lines through the given points.</summary>
    private static double Area(params (double W, double T)[] points) => points.Zip(points.Skip(1), (a, b) => (b.W - a.W) * (a.T + b.T) / 2).Sum();

    [Fact]
    public void Final_separations_give_the_toughness_as_area()
    {
        CurveNumbers bilinear = CurveNumbers.OfPeel("l", Of(new CurveDeck { Law = CurveShape.Bilinear, Stiffness = 10, Strength = 2, Toughness = 3 }), true);
        Close.To(3, Area((0, 0), (bilinear.ElasticLimit, 2), (bilinear.FinalSeparation, 0)));
        CurveNumbers open = CurveNumbers.OfPeel("l", Of(new CurveDeck { Law = CurveShape.Trapezoid, Stiffness = 10, Strength = 2, Toughness = 3 }), true);
        Close.To(3, Area((0, 0), (open.ElasticLimit, 2), (2 * open.FinalSeparation / 3, 2), (open.FinalSeparation, 0)));
        CurveNumbers until = CurveNumbers.OfPeel("l", Of(new CurveDeck { Law = CurveShape.Trapezoid, Stiffness = 10, Strength = 2, Toughness = 3, PlateauUntil = 0.7 }), true);
        Close.To(3, Area((0, 0), (until.ElasticLimit, 2), (0.7, 2), (until.FinalSeparation, 0)));
        CurveNumbers table = CurveNumbers.OfPeel("l", Of(new CurveDeck { Law = CurveShape.Table, Opening = [0, 0.3, 4, 7], Traction = [0, 0.42, 0.5, 0] }), true);
        Close.To(Area((0, 0), (0.3, 0.42), (4, 0.5), (7, 0)), table.Toughness);
        Assert.Equal((0.5, 0.3, 7), (table.Strength, table.ElasticLimit, table.FinalSeparation));
        Close.To(1.4, table.Stiffness);
    }

    [Fact]
    public void A_stiffness_left_out_comes_from_the_bulk()
    {
        CurveDeck curve = new() { Law = CurveShape.Bilinear, Strength = 2, Toughness = 3 };
        BulkDeck bulk = new() { Young = 100, Poisson = 0.3 };
        // Confined modulus 134.615 for E = 100, ν = 0.3; shear modulus 38.46; thickness 0.5 mm.
        Close.To(100 * 0.7 / (1.3 * 0.4) / 0.5, CurveNumbers.OfPeel("l", Of(curve, bulk), true).Stiffness);
        Close.To(100 / 2.6 / 0.5, CurveNumbers.OfShear("l", Of(curve, bulk)).Stiffness);
        BulkDeck loose = bulk with { BetweenFaces = Confinement.Unconfined };
        Close.To(200, CurveNumbers.OfPeel("l", Of(curve, loose), false).Stiffness);
        Close.To(200 / 0.91, CurveNumbers.OfPeel("l", Of(curve, loose), true).Stiffness);
    }

    [Fact]
    public void Curves_that_cannot_be_are_refused_at_their_key()
    {
        static DeckProblem Refusal(CurveDeck curve) => Assert.Throws<DeckException>(() => CurveNumbers.OfShear("tape", Of(curve))).Problems[0];
        Assert.Contains("`strength` is missing", Refusal(new CurveDeck { Law = CurveShape.Bilinear }).Message, StringComparison.Ordinal);
        Assert.Contains("`stiffness` is missing", Refusal(new CurveDeck { Law = CurveShape.Bilinear, Strength = 1, Toughness = 1 }).Message, StringComparison.Ordinal);
        Assert.Contains("beyond the elastic limit", Refusal(new CurveDeck { Law = CurveShape.Bilinear, Stiffness = 1, Strength = 10, Toughness = 1 }).Message, StringComparison.Ordinal);
        Assert.Equal("layers.tape.shear.sliding", Refusal(new CurveDeck { Law = CurveShape.Table, Sliding = [0, 2, 1], Traction = [0, 1, 0] }).Path);
        Assert.Equal("layers.tape.shear.traction", Refusal(new CurveDeck { Law = CurveShape.Table, Sliding = [0, 2, 3], Traction = [0, 1] }).Path);
        Assert.Equal("layers.tape.shear.traction", Refusal(new CurveDeck { Law = CurveShape.Table, Sliding = [0, 2, 3], Traction = [0, 0, 0] }).Path);
    }

    [Theory]
    // Zones of steel arms for a trapezoid 0.5 MPa, 0.2/3.2/5 mm, 2 N/mm, computed by beam models (project's physics notes): h, zone.
    [InlineData(6, 83)]
    [InlineData(8, 105)]
    [InlineData(10, 126)]
    [InlineData(12, 146)]
    [InlineData(16, 185)]
    public void Zones_of_tape_agree_with_computed_ones(double thickness, double zone)
    {
        CurveNumbers tape = new(0.5, 2, 2.5, 0.2, 5);
        // The fit was made on bilinear curves; a trapezoid's zone is 10 % shorter at the most.
        Close.To(zone, JointLength.ProcessZone(tape, true, 210e3 / 0.91, thickness, 1), 0.12);
    }

    [Fact]
    public void A_narrow_bond_counts_like_a_weak_bond_on_its_whole_arm()
    {
        CurveNumbers full = new(20, 0.5, 1e4, 2e-3, 0.05);
        CurveNumbers half = new(10, 0.25, 5e3, 2e-3, 0.05);
        Arm arm = new(70e3, 5, 20);
        JointLength narrow = JointLength.Choose(full, full, arm, arm, 10, 100, ElementKind.EightNode, 0);
        JointLength weak = JointLength.Choose(half, half, arm, arm, 20, 100, ElementKind.EightNode, 0);
        Close.To(weak.OnePercent, narrow.OnePercent);
        Close.To(weak.Zone, narrow.Zone);
        Close.To(weak.Default, narrow.Default);
        Assert.Equal(weak.Mode, narrow.Mode);
    }

    [Fact]
    public void The_mode_with_the_shorter_length_decides()
    {
        CurveNumbers brittle = new(60, 0.15, 1e6, 6e-5, 5e-3);
        CurveNumbers tough = new(20, 3, 1e4, 2e-3, 0.3);
        Arm arm = new(210e3, 5, 20);
        Assert.Equal("peel", JointLength.Choose(brittle, tough, arm, arm, 20, 100, ElementKind.EightNode, 0).Mode);
        Assert.Equal("shear", JointLength.Choose(tough, brittle, arm, arm, 20, 100, ElementKind.EightNode, 0).Mode);
    }

    [Fact]
    public void The_softer_arm_and_the_thinner_one_decide()
    {
        CurveNumbers curve = new(20, 0.5, 1e4, 2e-3, 0.05);
        Arm steel = new(210e3, 5, 20);
        double even = JointLength.Choose(curve, curve, steel, steel, 20, 100, ElementKind.EightNode, 0).OnePercent;
        Assert.True(JointLength.Choose(curve, curve, steel, steel with { Modulus = 20e3 }, 20, 100, ElementKind.EightNode, 0).OnePercent < even);
        Assert.True(JointLength.Choose(curve, curve, steel, steel with { Thickness = 2 }, 20, 100, ElementKind.EightNode, 0).OnePercent < even);
        Close.To(even, JointLength.Choose(curve, curve, steel, steel with { Thickness = 50 }, 20, 100, ElementKind.EightNode, 0).OnePercent);
    }

    [Fact]
    public void A_short_bond_gets_ten_elements()
    {
        Mesh mesh = MeshFacts.Check(Deck(
            new() { ["a"] = Rectangle(0, 0, 100, 20), ["b"] = Rectangle(92, 20, 100, 20) }, new() { ["j"] = Joint("bottom of b", "top of a") })).Mesh;
        Assert.Equal(10, mesh.Joints[0].ElementCount);
    }

    [Fact]
    public void A_short_bonded_stretch_does_not_refine_the_others()
    {
        Deck deck = Peel(400, 10, 60, Tape);
        JointDeck bond = deck.Joints!["bond"] with { Unbonded = [new StretchDeck { From = 65, To = 100 }] };
        MeshedJoint joint = MeshFacts.Check(deck with { Joints = new Dictionary<string, JointDeck> { ["bond"] = bond } }).Mesh.Joints[0];
        int first = Array.IndexOf(joint.Bonded, true);
        Close.To(0.5, joint.Position[first + 1] - joint.Position[first], 1e-9);
        Assert.InRange(joint.Position[^1] - joint.Position[^2], 0.95 * 0.05 * joint.ProcessZoneEstimate, 0.05 * joint.ProcessZoneEstimate);
    }

    [Theory]
    [InlineData(0.7)]
    [InlineData(5)]
    [InlineData(17)]
    [InlineData(20)]
    [InlineData(34)]
    public void A_bond_is_divided_evenly_whatever_its_length_of_element(double length)
    {
        Deck deck = Peel(400, 10, 60, Tape);
        JointDeck bond = deck.Joints!["bond"] with { ElementLength = length };
        MeshedJoint joint = MeshFacts.Check(deck with { Joints = new Dictionary<string, JointDeck> { ["bond"] = bond } }).Mesh.Joints[0];
        int number = (int)Math.Ceiling(340 / length - 1e-9);
        Assert.Equal(number, joint.Bonded.Count(b => b));
        for (int e = Array.IndexOf(joint.Bonded, true); e < joint.ElementCount; e++)
            Close.To(340.0 / number, joint.Position[e + 1] - joint.Position[e], 1e-6);
    }

    [Theory]
    [InlineData(120)]
    [InlineData(160)]
    [InlineData(200)]
    [InlineData(233)]
    public void A_default_bond_is_divided_evenly_next_to_a_short_starter_crack(double length)
    {
        MeshedJoint joint = MeshFacts.Check(Peel(length, 10, 30, Tape)).Mesh.Joints[0];
        int first = Array.IndexOf(joint.Bonded, true);
        for (int e = first; e < joint.ElementCount; e++)
            Close.To((length - 30) / (joint.ElementCount - first), joint.Position[e + 1] - joint.Position[e], 1e-6);
    }

    [Fact]
    public void A_bond_wider_than_its_adherend_is_refused()
    {
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 100, 2), ["b"] = Rectangle(0, 2, 100, 2, width: 15) }, new() { ["j"] = Joint("bottom of b", "top of a") });
        MeshFacts.Refused(deck, "joints.j.width", "20 mm wide, is wider than \"b\", 15 mm", "the model's");
    }

    [Fact]
    public void Independent_modes_need_elements_of_half_the_stretch_on_which_they_release()
    {
        var curve = new CurveNumbers(0.5, 1.9, 2, 0.2, 5.2);
        var arm = new Arm(70e3, 3, 20);
        JointLength plain = JointLength.Choose(curve, curve, arm, arm, 20, 1000, ElementKind.EightNode, 0);
        JointLength released = JointLength.Choose(curve, curve, arm, arm, 20, 1000, ElementKind.EightNode, 0.05);
        Close.To(0.05 * released.Zone, released.Default);
        Assert.True(released.Default < plain.Default);
        Close.To(0.5 * released.Default, JointLength.Choose(curve, curve, arm, arm, 20, 1000, ElementKind.FourNode, 0.05).Default);
    }
}
