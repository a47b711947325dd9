using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class JointMeshTests
{
    private static readonly StarterCrackDeck Crack = new() { From = JointEnd.Start, Length = 37.3 };

    private static (double From, double To)[] BondedStretches(MeshedJoint joint)
    {
        List<(double From, double To)> stretches = [];
        for (int e = 0; e < joint.ElementCount; e++)
        {
            if (!joint.Bonded[e])
                continue;
            if (stretches.Count > 0 && stretches[^1].To == joint.Position[e])
                stretches[^1] = (stretches[^1].From, joint.Position[e + 1]);
            else
                stretches.Add((joint.Position[e], joint.Position[e + 1]));
        }
        return [.. stretches];
    }

    [Theory]
    [InlineData(ElementKind.EightNode)]
    [InlineData(ElementKind.FourNode)]
    public void A_peel_coupon_is_paired_over_its_whole_face_and_its_tip_is_a_node(ElementKind kind)
    {
        Mesh mesh = MeshFacts.Check(Peel(160, 6, 60, Epoxy, kind)).Mesh;
        MeshedJoint joint = mesh.Joints[0];
        Assert.Equal((1, 0), (joint.UpperAdherend, joint.LowerAdherend));
        Close.To(160, joint.Position[^1]);
        (double from, double to) = Assert.Single(BondedStretches(joint));
        Assert.Equal(60, from);
        Assert.Equal(160, to);
        Assert.Equal(mesh.Adherends[0].Edges["top"].Nodes.Length, joint.ElementCount * (mesh.NodesPerFace - 1) + 1);
        // Graded away from the tip along the starter crack, even along the bond.
        double[] lengths = [.. Enumerable.Range(0, joint.ElementCount).Select(e => joint.Position[e + 1] - joint.Position[e])];
        int tip = Array.IndexOf(joint.Bonded, true);
        Close.To(lengths[tip], lengths[^1], 1e-9);
        Assert.True(lengths[0] > 2 * lengths[tip]);
    }

    [Fact]
    public void A_lap_with_overhangs_on_both_sides_is_joined_where_the_faces_overlap()
    {
        Mesh mesh = MeshFacts.Check(Deck(
            new() { ["left"] = Rectangle(0, 0, 100, 2), ["right"] = Rectangle(75, 2, 100, 3) },
            new() { ["lap"] = Joint("bottom of right", "top of left") }, Epoxy)).Mesh;
        MeshedJoint joint = mesh.Joints[0];
        Close.To(25, joint.Position[^1]);
        Close.To(75, mesh.X[joint.LowerNodes[0]]);
        Close.To(100, mesh.X[joint.UpperNodes[^1]]);
        Assert.All(joint.Bonded, Assert.True);
    }

    [Fact]
    public void A_middle_adherend_bonded_on_both_faces_has_one_division()
    {
        Mesh mesh = MeshFacts.Check(Deck(
            new() { ["base"] = Rectangle(0, 0, 120, 5), ["middle"] = Rectangle(20, 5, 90.5, 2), ["cover"] = Rectangle(60, 7, 100, 1.5) },
            new()
            {
                ["first"] = Joint("bottom of middle", "top of base", crack: Crack),
                ["second"] = Joint("bottom of cover", "top of middle", unbonded: [new StretchDeck { From = 11.1, To = 13.2 }]),
            }, Epoxy)).Mesh;
        (double from, double to) = Assert.Single(BondedStretches(mesh.Joints[0]));
        Close.To(37.3, from);
        Close.To(90.5, to);
        (double From, double To)[] second = BondedStretches(mesh.Joints[1]);
        Assert.Equal(2, second.Length);
        Close.To(11.1, second[0].To);
        Close.To(13.2, second[1].From);
        Close.To(50.5, second[1].To);
        foreach (MeshedAdherend adherend in mesh.Adherends)
        {
            double[] lengths = MeshFacts.Lengths(mesh, adherend.Edges["top"]);
            for (int i = 1; i < lengths.Length; i++)
                Assert.True(Math.Max(lengths[i] / lengths[i - 1], lengths[i - 1] / lengths[i]) <= 1.3 * (1 + 1e-8));
        }
    }

    [Fact]
    public void Unbonded_stretches_that_touch_or_reach_the_ends_are_taken_together()
    {
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 100, 2), ["b"] = Rectangle(0, 2, 100, 2) },
            new()
            {
                ["j"] = Joint("bottom of b", "top of a", crack: new StarterCrackDeck { From = JointEnd.End, Length = 20 },
                    unbonded: [new StretchDeck { From = 70, To = 85 }, new StretchDeck { From = 0, To = 10 }, new StretchDeck { From = 10, To = 12 }]),
            });
        (double from, double to) = Assert.Single(BondedStretches(MeshFacts.Check(deck).Mesh.Joints[0]));
        Close.To(12, from);
        Close.To(70, to);
    }

    [Fact]
    public void A_given_element_length_is_kept_and_warned_about_when_too_long()
    {
        Deck deck = Peel(160, 6, 60, Epoxy);
        deck = deck with { Joints = new Dictionary<string, JointDeck> { ["bond"] = deck.Joints!["bond"] with { ElementLength = 8 } } };
        MeshingResult result = MeshFacts.Check(deck);
        MeshedJoint joint = result.Mesh.Joints[0];
        int tip = Array.IndexOf(joint.Bonded, true);
        Close.To(100.0 / 13, joint.Position[tip + 1] - joint.Position[tip], 1e-9);
        Assert.Contains("about 1 %", Assert.Single(result.Warnings), StringComparison.Ordinal);
        Assert.Empty(Mesher.Build(Peel(160, 6, 60, Epoxy)).Warnings);
    }

    [Fact]
    public void Default_lengths_follow_from_zone_arm_and_decay()
    {
        // Tape on 10 mm steel: the zone is long; half the stretch on which independent modes release (5 % of their final separation each) decides.
        MeshedJoint tape = MeshFacts.Check(Peel(400, 10, 60, Tape)).Mesh.Joints[0];
        Assert.InRange(tape.Position[^1] - tape.Position[^2], 0.95 * 0.05 * tape.ProcessZoneEstimate, 0.05 * tape.ProcessZoneEstimate);
        // Published zone of such arms: 126 mm measured with the plateau of 3.2 mm (project's physics notes), the formula gives 8 % more.
        Close.To(126, tape.ProcessZoneEstimate, 0.10);
        // Epoxy on 6 mm steel: λ⁴ = 6k/(E'h³) with E' = 210000/0.91; a third of 1/λ or, for bilinear curves, four times the release share of the zone decides.
        double decay = Math.Pow(6e5 / (210e3 / 0.91 * 216), -0.25);
        MeshedJoint epoxy = MeshFacts.Check(Peel(160, 6, 60, Epoxy)).Mesh.Joints[0];
        double length = epoxy.Position[^1] - epoxy.Position[^2];
        double release = 4 * 0.05 * epoxy.ProcessZoneEstimate;
        Assert.InRange(length, 0.97 * Math.Min(decay / 3, release), Math.Min(decay / 3, release) * (1 + 1e-9));
        Assert.True(length <= epoxy.OnePercentLength / 2);
    }

    [Fact]
    public void Four_node_elements_are_shorter_along_a_joint()
    {
        MeshedJoint eight = Mesher.Build(Peel(160, 6, 60, Epoxy)).Mesh.Joints[0];
        MeshedJoint four = Mesher.Build(Peel(160, 6, 60, Epoxy, ElementKind.FourNode)).Mesh.Joints[0];
        Close.To(eight.OnePercentLength / 3, four.OnePercentLength);
        Assert.True(four.ElementCount > 1.5 * eight.ElementCount);
    }

    [Fact]
    public void Even_divisions_that_agree_are_paired_and_lines_move_to_the_tip()
    {
        ElementsDeck hundred = new() { Along = 100, Through = 2 };
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 200, 4, hundred), ["b"] = Rectangle(0, 4, 200, 4, hundred) },
            new() { ["j"] = Joint("bottom of b", "top of a", crack: new StarterCrackDeck { From = JointEnd.Start, Length = 50.7 }) }, Tape);
        MeshingResult result = MeshFacts.Check(deck);
        MeshedJoint joint = result.Mesh.Joints[0];
        Assert.Equal(100, joint.ElementCount);
        Assert.Equal(50.7, joint.Position[Array.IndexOf(joint.Bonded, true)]);
        Assert.Equal(25, Array.IndexOf(joint.Bonded, true));
        Assert.Contains(result.Notes, n => n.Contains("moved by up to 0.7 mm", StringComparison.Ordinal));
    }

    [Fact]
    public void A_free_mate_takes_the_given_division_of_the_other()
    {
        Deck deck = Deck(
            new() { ["panel"] = Rectangle(0, 0, 300, 4, new ElementsDeck { Along = 300, Through = 4 }), ["hat"] = Hat() },
            new() { ["left strip"] = Joint("left foot of hat", "top of panel") });
        Mesh mesh = MeshFacts.Check(deck).Mesh;
        Assert.Equal(300, mesh.Adherends[0].ElementsAlong);
        for (int e = 0; e < mesh.Joints[0].ElementCount; e++)
            Close.To(1, mesh.Joints[0].Position[e + 1] - mesh.Joints[0].Position[e], 0.1);
    }

    [Fact]
    public void Unequal_even_divisions_are_refused_with_the_number_that_fits()
    {
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 200, 4, new ElementsDeck { Along = 100 }), ["b"] = Rectangle(0, 4, 200, 4, new ElementsDeck { Along = 50 }) },
            new() { ["j"] = Joint("bottom of b", "top of a") });
        MeshFacts.Refused(deck, "adherends.b.elements.along", "50 elements and \"a\"", "100", "take 100 here", "leave `along` out");
    }

    [Fact]
    public void An_even_division_too_coarse_for_its_places_is_refused()
    {
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 200, 40, new ElementsDeck { Along = 4 }), ["b"] = Rectangle(0, 40, 200, 40) },
            new() { ["j"] = Joint("bottom of b", "top of a", crack: new StarterCrackDeck { From = JointEnd.Start, Length = 10 }) });
        MeshFacts.Refused(deck, "adherends.a.elements.along", "4 elements are too few", "10 mm apart", "take about 20");
    }

    [Fact]
    public void An_element_length_against_a_given_number_is_refused()
    {
        Deck deck = Deck(
            new() { ["a"] = Rectangle(0, 0, 200, 4, new ElementsDeck { Along = 100 }), ["b"] = Rectangle(0, 4, 200, 4) },
            new() { ["j"] = Joint("bottom of b", "top of a", length: 1) });
        MeshFacts.Refused(deck, "adherends.a.elements.along", "2 mm long", "joint \"j\"", "`element length` of 1 mm");
    }

    [Fact]
    public void Edges_that_do_not_overlap_are_refused_with_both_ranges()
    {
        Deck deck = Deck(new() { ["a"] = Rectangle(0, 0, 100, 4), ["b"] = Rectangle(120, 4, 100, 4) }, new() { ["j"] = Joint("bottom of b", "top of a") });
        MeshFacts.Refused(deck, "joints.j", "from 120 to 220 mm", "from 0 to 100 mm", "20 mm between them");
    }

    [Fact]
    public void Faces_apart_are_refused_with_the_gap_and_the_layer_thickness_is_recognised()
    {
        Deck Apart(double gap) => Deck(new() { ["a"] = Rectangle(0, 0, 100, 4), ["b"] = Rectangle(0, 4 + gap, 100, 4) }, new() { ["j"] = Joint("bottom of b", "top of a") });
        MeshFacts.Refused(Apart(1.1), "joints.j", "the layer's thickness apart", "`drawn: true thickness`", "down by 1.1 mm");
        MeshFacts.Refused(Apart(0.3), "joints.j", "must coincide", "down by 0.3 mm");
        MeshFacts.Refused(Apart(-1), "joints.j", "1 mm below");
        MeshFacts.Check(Apart(1e-6));
        MeshFacts.Refused(Apart(1e-5), "joints.j", "must coincide");
    }

    [Fact]
    public void A_layer_drawn_at_true_thickness_keeps_its_faces_that_far_apart()
    {
        Deck Apart(double gap) => Deck(new() { ["a"] = Rectangle(0, 0, 100, 4), ["b"] = Rectangle(0, 4 + gap, 100, 4) },
            new() { ["j"] = Joint("bottom of b", "top of a") with { Drawn = DrawnThickness.True } });
        Mesh mesh = Mesher.Build(Apart(1.1)).Mesh;
        for (int i = 0; i < mesh.Joints[0].LowerNodes.Length; i++)
        {
            Assert.Equal(mesh.X[mesh.Joints[0].LowerNodes[i]], mesh.X[mesh.Joints[0].UpperNodes[i]]);
            Assert.Equal(1.1, mesh.Y[mesh.Joints[0].UpperNodes[i]] - mesh.Y[mesh.Joints[0].LowerNodes[i]], 12);
        }
        MeshFacts.Refused(Apart(0), "joints.j", "1.1 mm", "up by 1.1 mm");
        MeshFacts.Refused(Apart(1.3), "joints.j", "1.1 mm", "down by 0.2 mm");
    }

    [Fact]
    public void Faces_that_do_not_face_each_other_are_refused()
    {
        Dictionary<string, AdherendDeck> two() => new() { ["a"] = Rectangle(0, 0, 100, 4), ["b"] = Rectangle(0, 4, 100, 4) };
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("top of a", "bottom of b") }), "joints.j", "exchange");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("top of b", "top of a") }), "joints.j", "\"top of b\" looks up");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("bottom of b", "bottom of a") }), "joints.j", "\"bottom of a\" looks down");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("left end of b", "right end of a") }), "joints.j.upper", "is an end");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("bottom of a", "top of a") }), "joints.j", "joint bonds two adherends");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("bottom of c", "top of a") }), "joints.j.upper", "no adherend \"c\"", "a, b");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("underside of b", "top of a") }), "joints.j.upper", "no edge \"underside\"");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("bottom of b", "top of a", layer: "glue") }), "joints.j.layer", "no layer \"glue\"");
        MeshFacts.Refused(Deck(two(), new() { ["j"] = Joint("bottom of b", "top of a"), ["k"] = Joint("bottom of b", "top of a") }), "joints.k", "already bonds");
    }

    [Fact]
    public void Cracks_that_leave_no_bond_are_refused()
    {
        Deck With(StarterCrackDeck? crack, params StretchDeck[] unbonded) => Deck(
            new() { ["a"] = Rectangle(0, 0, 100, 4), ["b"] = Rectangle(0, 4, 100, 4) }, new() { ["j"] = Joint("bottom of b", "top of a", crack: crack, unbonded: unbonded) });
        MeshFacts.Refused(With(new StarterCrackDeck { From = JointEnd.End, Length = 100 }), "joints.j.starter crack.length", "100 mm");
        MeshFacts.Refused(With(null, new StretchDeck { From = 40, To = 30 }), "joints.j.unbonded.1", "run forward");
        MeshFacts.Refused(With(null, new StretchDeck { From = 40, To = 101 }), "joints.j.unbonded.1", "0 to 100 mm");
        MeshFacts.Refused(With(new StarterCrackDeck { From = JointEnd.Start, Length = 60 }, new StretchDeck { From = 50, To = 100 }), "joints.j", "nothing is bonded");
    }

    [Fact]
    public void The_same_deck_gives_the_same_bytes()
    {
        Mesh first = Mesher.Build(HatOnPanel()).Mesh;
        Mesh second = Mesher.Build(HatOnPanel()).Mesh;
        Assert.Equal(first.X, second.X);
        Assert.Equal(first.Y, second.Y);
        Assert.Equal(first.Adherends[1].Connectivity, second.Adherends[1].Connectivity);
    }
}
