using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class SheetMeshTests
{
    /// <summary>Length of the mid-line of a polyline with corners rounded by a radius: runs less two tangents, plus arcs.</summary>
    private static double MidLine(double[][] line, double radius)
    {
        double length = 0;
        double before = double.NaN;
        for (int i = 1; i < line.Length; i++)
        {
            double dx = line[i][0] - line[i - 1][0];
            double dy = line[i][1] - line[i - 1][1];
            double angle = Math.Atan2(dy, dx);
            length += Math.Sqrt(dx * dx + dy * dy);
            if (!double.IsNaN(before))
            {
                double turn = Math.Abs(Math.IEEERemainder(angle - before, 2 * Math.PI));
                length += radius * (turn - 2 * Math.Tan(turn / 2));
            }
            before = angle;
        }
        return length;
    }

    [Theory]
    [InlineData(ElementKind.EightNode, false)]
    [InlineData(ElementKind.EightNode, true)]
    [InlineData(ElementKind.FourNode, false)]
    [InlineData(ElementKind.FourNode, true)]
    public void A_hat_on_a_panel_is_joined_at_both_feet_whichever_way_its_line_is_walked(ElementKind kind, bool walkedBack)
    {
        Mesh mesh = MeshFacts.Check(HatOnPanel(kind, walkedBack)).Mesh;
        Assert.Equal(2, mesh.Joints.Count);
        // The foot ends where the bend starts: tangent length R·tan(turn/2).
        double tangent = 6 * Math.Tan(Math.Atan2(40, 10) / 2);
        Close.To(60 - tangent, mesh.Joints[0].Position[^1], 1e-12);
        Close.To(60, mesh.X[mesh.Joints[0].LowerNodes[0]]);
        Close.To(180 + tangent, mesh.X[mesh.Joints[1].LowerNodes[0]]);
        Close.To(240, mesh.X[mesh.Joints[1].LowerNodes[^1]]);
        Assert.False(mesh.Adherends[1].StraightAlongX);
        // Even thickness: area is mid-line times thickness, bends included (annulus sector R·turn·t).
        double exact = 2 * MidLine([[60, 5], [120, 5], [130, 45], [170, 45], [180, 5], [240, 5]], 6);
        Close.To(exact, MeshFacts.Area(mesh, mesh.Adherends[1]), kind == ElementKind.EightNode ? 1e-5 : 1e-3);
        Close.To(1200, MeshFacts.Area(mesh, mesh.Adherends[0]));
    }

    [Fact]
    public void A_quarter_bend_has_the_area_of_its_sector_and_eight_elements()
    {
        double[][] line = [[0, 0], [20, 0], [20, 20]];
        Mesh mesh = MeshFacts.Check(Deck(new() { ["bracket"] = Sheet(2, 5, line) })).Mesh;
        MeshedAdherend bracket = mesh.Adherends[0];
        Close.To(2 * (30 + 5 * Math.PI / 2), MeshFacts.Area(mesh, bracket), 1e-5);
        int[] mid = [.. Enumerable.Range(0, mesh.NodeCount).Where(n => Math.Abs(Math.Sqrt(Math.Pow(mesh.X[n] - 15, 2) + Math.Pow(mesh.Y[n] - 5, 2)) - 5) < 1e-9 && mesh.X[n] >= 15 && mesh.Y[n] <= 5)];
        // All nodes of the bend's mid-line, those in the middle of sides as well, lie on the arc.
        Assert.True(mid.Length >= 17);
        Close.To(30 + 4 * Math.PI / 2, bracket.Edges["upper face"].Length, 1e-12);
        Close.To(30 + 6 * Math.PI / 2, bracket.Edges["lower face"].Length, 1e-12);
    }

    [Fact]
    public void Bends_to_either_side_turn_the_right_way()
    {
        foreach (double sign in new[] { 1.0, -1.0 })
        {
            Mesh mesh = MeshFacts.Check(Deck(new() { ["z"] = Sheet(1, 3, [[0, 0], [20, 0], [25, sign * 15], [50, sign * 15]]) })).Mesh;
            MeshedAdherend z = mesh.Adherends[0];
            Close.To(MidLine([[0, 0], [20, 0], [25, sign * 15], [50, sign * 15]], 3), MeshFacts.Area(mesh, z), 1e-5);
            int end = z.Edges["right end"].Nodes[0];
            Close.To(50, mesh.X[end], 1e-12);
            Close.To(sign * 15 - 0.5, mesh.Y[end], 1e-12);
        }
    }

    [Fact]
    public void Upper_is_to_the_left_of_the_walk_and_stretches_have_two_faces()
    {
        Mesh forward = MeshFacts.Check(HatOnPanel()).Mesh;
        Mesh back = MeshFacts.Check(HatOnPanel(walkedBack: true)).Mesh;
        EdgeFinder finder = new(forward);
        Assert.All(finder.Find("left foot upper face of hat", "p").Edge.Nodes, n => Close.To(6, forward.Y[n]));
        Assert.All(finder.Find("left foot lower face of hat", "p").Edge.Nodes, n => Close.To(4, forward.Y[n]));
        Assert.Equal(finder.Find("crown upper face of hat", "p").Edge.Nodes, finder.Find("crown of hat", "p").Edge.Nodes);
        Assert.All(finder.Find("crown of hat", "p").Edge.Nodes, n => Close.To(46, forward.Y[n]));
        Assert.All(new EdgeFinder(back).Find("left foot upper face of hat", "p").Edge.Nodes, n => Close.To(4, back.Y[n]));
        Close.To(60, forward.X[finder.Find("left end of hat", "p").Edge.Nodes[0]]);
        Close.To(240, back.X[new EdgeFinder(back).Find("left end of hat", "p").Edge.Nodes[0]]);
    }

    [Fact]
    public void A_mirrored_deck_gives_the_mirrored_mesh()
    {
        // The hat lies even about x = 150; its panel has a grip to one side whose mirror image is added in the second deck's place.
        Mesh mesh = MeshFacts.Check(HatOnPanel(grips: new() { ["g"] = new GripDeck { On = ["crown of hat"], At = new EdgePoint(0.5, double.NaN) } })).Mesh;
        double middle = mesh.X[mesh.Adherends[1].Edges["crown"].Nodes[mesh.Adherends[1].Edges["crown"].Nearest(mesh.Adherends[1].Edges["crown"].Length / 2)]];
        Close.To(150, middle, 1e-12);
        foreach (MeshedAdherend adherend in mesh.Adherends)
            foreach (string name in adherend.Edges.Keys.Where(k => k is "top" or "bottom" or "upper face" or "lower face"))
            {
                int[] nodes = adherend.Edges[name].Nodes;
                for (int i = 0; i < nodes.Length; i++)
                {
                    Close.To(300 - mesh.X[nodes[i]], mesh.X[nodes[^(i + 1)]], 0, 1e-9, name);
                    Close.To(mesh.Y[nodes[i]], mesh.Y[nodes[^(i + 1)]], 0, 1e-9, name);
                }
            }
    }

    [Fact]
    public void Places_on_bent_faces_count_along_the_true_arc()
    {
        GripDeck grip = new() { On = ["lower face of bracket"], At = new EdgePoint(double.NaN, 15 + 6 * Math.PI / 4) };
        Mesh mesh = MeshFacts.Check(Deck(new() { ["bracket"] = Sheet(2, 5, [[0, 0], [20, 0], [20, 20]]) }, grips: new() { ["g"] = grip })).Mesh;
        MeshedEdge face = mesh.Adherends[0].Edges["lower face"];
        int at = face.Nearest(15 + 6 * Math.PI / 4);
        Assert.Equal(0, at % 2);
        Close.To(15 + 6 * Math.Sqrt(0.5), mesh.X[face.Nodes[at]], 1e-12);
        Close.To(5 - 6 * Math.Sqrt(0.5), mesh.Y[face.Nodes[at]], 1e-12);
    }

    [Fact]
    public void Neighbours_grow_by_the_ratio_across_bends_and_joint_ends()
    {
        foreach (ElementKind kind in new[] { ElementKind.EightNode, ElementKind.FourNode })
        {
            Mesh mesh = MeshFacts.Check(HatOnPanel(kind)).Mesh;
            MeshedAdherend hat = mesh.Adherends[1];
            double[] upper = MeshFacts.Lengths(mesh, hat.Edges["upper face"]);
            double[] lower = MeshFacts.Lengths(mesh, hat.Edges["lower face"]);
            double[] mid = [.. upper.Zip(lower, (a, b) => (a + b) / 2)];
            for (int i = 1; i < mid.Length; i++)
                Assert.True(Math.Max(mid[i] / mid[i - 1], mid[i - 1] / mid[i]) <= 1.3 * (1 + 1e-8));
        }
    }

    [Fact]
    public void Points_on_one_line_need_no_bend_and_may_name_stretches()
    {
        Deck deck = Deck(
            new() { ["strip"] = Sheet(1, null, [[0, 2.5], [30, 2.5], [80, 2.5], [100, 2.5]], new() { ["bonded part"] = 2 }), ["base"] = Rectangle(0, 0, 100, 2) },
            new() { ["j"] = Joint("bonded part of strip", "top of base") });
        Mesh mesh = MeshFacts.Check(deck).Mesh;
        Assert.True(mesh.Adherends[0].StraightAlongX);
        Close.To(30, mesh.X[mesh.Joints[0].LowerNodes[0]]);
        Close.To(50, mesh.Joints[0].Position[^1]);
    }

    [Fact]
    public void Numbers_along_a_sheet_are_shared_by_length()
    {
        Mesh mesh = MeshFacts.Check(Deck(new() { ["bracket"] = Sheet(2, 5, [[0, 0], [20, 0], [20, 20]], null, new ElementsDeck { Along = 37, Through = 2 }) })).Mesh;
        Assert.Equal(37, mesh.Adherends[0].ElementsAlong);
    }

    [Fact]
    public void Wrong_sheets_are_refused_at_their_place()
    {
        static Deck Of(AdherendDeck hat) => Deck(new() { ["hat"] = hat });
        double[][] corner = [[0, 0], [20, 0], [20, 20]];
        MeshFacts.Refused(Of(Sheet(2, null, corner)), "adherends.hat.sheet", "give a `bend radius`", "1 mm");
        MeshFacts.Refused(Of(Sheet(2, 0.9, corner)), "adherends.hat.sheet.bend radius", "half the thickness, 1 mm");
        MeshFacts.Refused(Of(Sheet(2, 1, corner)), "adherends.hat.sheet.bend radius", "half the thickness, 1 mm");
        MeshFacts.Refused(Of(Sheet(2, 15, [[0, 0], [20, 0], [20, 20], [40, 20]])), "adherends.hat.sheet.bend radius", "take 30 mm of run 2", "20 mm long");
        MeshFacts.Refused(Of(Sheet(2, 5, [[0, 0], [20, 0], [5, 0]])), "adherends.hat.sheet.line.2", "back on itself");
        MeshFacts.Refused(Of(Sheet(2, 5, [[0, 0], [20, 0], [20, 0]])), "adherends.hat.sheet.line.3", "falls on the one before");
        MeshFacts.Refused(Of(Sheet(2, 5, [[0, 0]])), "adherends.hat.sheet.line", "two corner points");
        MeshFacts.Refused(Of(Sheet(2, 5, [[0, 0], [1, 2, 3]])), "adherends.hat.sheet.line.2", "two coordinates");
        MeshFacts.Refused(Of(Sheet(2, 5, corner, new() { ["web"] = 3 })), "adherends.hat.sheet.stretches.web", "runs 1 to 2");
        MeshFacts.Refused(Of(Sheet(2, 5, corner, new() { ["left end"] = 1 })), "adherends.hat.sheet.stretches.left end", "clashes");
        MeshFacts.Refused(Of(Sheet(2, 10, [[0, 0], [20, 0], [20, 20], [40, 20]], new() { ["web"] = 2 })), "adherends.hat.sheet.stretches.web", "nothing straight");
        MeshFacts.Refused(Of(Sheet(2, 5, corner, null, new ElementsDeck { Along = 2 })), "adherends.hat.elements.along", "too few");
    }

    [Fact]
    public void Bends_that_use_up_a_run_meet_each_other()
    {
        Mesh mesh = MeshFacts.Check(Deck(new() { ["s"] = Sheet(2, 10, [[0, 0], [20, 0], [20, 20], [40, 20]]) })).Mesh;
        Close.To(2 * (20 + 10 * Math.PI), MeshFacts.Area(mesh, mesh.Adherends[0]), 1e-5);
    }

    [Fact]
    public void Joints_on_bent_or_sloping_edges_are_refused()
    {
        Dictionary<string, AdherendDeck> both = new() { ["panel"] = Rectangle(0, 0, 300, 4), ["hat"] = Sheet(2, 6, [[60, 5], [120, 5], [130, 45]], new() { ["web"] = 2 }) };
        MeshFacts.Refused(Deck(both, new() { ["j"] = Joint("lower face of hat", "top of panel") }), "joints.j.upper", "name the straight run in `stretches`");
        MeshFacts.Refused(Deck(both, new() { ["j"] = Joint("web of hat", "top of panel") }), "joints.j.upper", "must lie along x");
    }
}
