using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;
using static InterfaceFE.Tests.Geometry.MeshDecks;

namespace InterfaceFE.Tests.Geometry;

public class RectangleMeshTests
{
    [Fact]
    public void Given_numbers_make_an_even_mesh_of_eight_node_elements()
    {
        Mesh mesh = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(-5, 2, 300, 4, new ElementsDeck { Along = 30, Through = 3 }) })).Mesh;
        MeshedAdherend panel = mesh.Adherends[0];
        Assert.Equal((30, 3), (panel.ElementsAlong, panel.ElementsThrough));
        Assert.Equal(31 * 7 + 30 * 4, mesh.NodeCount);
        Close.To(1200, MeshFacts.Area(mesh, panel));
        Assert.True(panel.StraightAlongX);
        // Second element of the first column: its corners and the middles of its sides.
        int[] second = panel.Connectivity[8..16];
        (double, double)[] expected = [(-5, 2 + 4 / 3.0), (5, 2 + 4 / 3.0), (5, 2 + 8 / 3.0), (-5, 2 + 8 / 3.0), (0, 2 + 4 / 3.0), (5, 4), (0, 2 + 8 / 3.0), (-5, 4)];
        for (int i = 0; i < 8; i++)
        {
            Close.To(expected[i].Item1, mesh.X[second[i]], 0, 1e-12);
            Close.To(expected[i].Item2, mesh.Y[second[i]], 0, 1e-12);
        }
    }

    [Fact]
    public void Four_node_elements_have_no_middle_nodes()
    {
        Mesh mesh = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(0, 0, 300, 4, new ElementsDeck { Along = 30, Through = 3 }) }, kind: ElementKind.FourNode)).Mesh;
        Assert.Equal(31 * 4, mesh.NodeCount);
        Assert.Equal(2, mesh.NodesPerFace);
        Close.To(1200, MeshFacts.Area(mesh, mesh.Adherends[0]));
    }

    [Fact]
    public void Edges_start_at_the_lower_coordinate_and_lie_where_their_names_say()
    {
        Mesh mesh = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(10, 20, 30, 4) })).Mesh;
        EdgeFinder finder = new(mesh);
        Assert.All(finder.Find("top of panel", "p").Edge.Nodes, n => Close.To(24, mesh.Y[n]));
        Assert.All(finder.Find("bottom of panel", "p").Edge.Nodes, n => Close.To(20, mesh.Y[n]));
        Assert.All(finder.Find("left end of panel", "p").Edge.Nodes, n => Close.To(10, mesh.X[n]));
        Assert.All(finder.Find("right end of panel", "p").Edge.Nodes, n => Close.To(40, mesh.X[n]));
        Close.To(30, finder.Find("top of panel", "p").Edge.Length);
        Close.To(4, finder.Find("left end of panel", "p").Edge.Length);
    }

    [Fact]
    public void Adherend_names_may_not_hide_edge_names_with_spaces()
    {
        Mesh mesh = Mesher.Build(Deck(new() { ["arm"] = Rectangle(0, 0, 30, 4) })).Mesh;
        Assert.Equal("left end", new EdgeFinder(mesh).Find("left end of arm", "p").Name);
        Assert.Equal(new EdgeName("foot of the left", "hat"), EdgeName.Parse("foot of the left of hat", "p"));
        DeckException noOf = Assert.Throws<DeckException>(() => new EdgeFinder(mesh).Find("top", "grips.a.on"));
        Assert.Equal("grips.a.on", noOf.Problems[0].Path);
        Assert.Contains("EDGE of ADHEREND", noOf.Problems[0].Message, StringComparison.Ordinal);
        Assert.Contains("there are: arm", Assert.Throws<DeckException>(() => new EdgeFinder(mesh).Find("top of leg", "p")).Message, StringComparison.Ordinal);
        Assert.Contains("top, bottom, left end, right end", Assert.Throws<DeckException>(() => new EdgeFinder(mesh).Find("upper face of arm", "p")).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Grips_and_gauges_fall_on_corner_nodes()
    {
        Dictionary<string, GripDeck> grips = new()
        {
            ["pin"] = new GripDeck { On = ["top of panel"], At = new EdgePoint(double.NaN, 33.3) },
            ["block"] = new GripDeck { On = ["bottom of panel"], From = 71.2, To = 90.7 },
            ["side"] = new GripDeck { On = ["right end of panel"], At = new EdgePoint(double.NaN, 1.1) },
        };
        KeepDeck keep = new() { Gauges = new Dictionary<string, GaugeDeck> { ["g"] = new() { Kind = GaugeKind.ClipGauge, On = "top of panel", At = new EdgePoint(0.5, double.NaN), To = "bottom of panel", ToAt = new EdgePoint(double.NaN, 12.25) } } };
        foreach (ElementKind kind in new[] { ElementKind.EightNode, ElementKind.FourNode })
        {
            Mesh mesh = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(10, 0, 300, 4) }, grips: grips, keep: keep, kind: kind)).Mesh;
            MeshedEdge top = mesh.Adherends[0].Edges["top"];
            int step = mesh.NodesPerFace - 1;
            foreach (double at in new[] { 33.3, 71.2, 90.7, 150, 12.25 })
            {
                int nearest = top.Nearest(at);
                Assert.Equal(0, nearest % step);
                Close.To(at, top.Arc[nearest], 1e-12);
            }
            MeshedEdge end = mesh.Adherends[0].Edges["right end"];
            Close.To(1.1, end.Arc[end.Nearest(1.1)], 1e-12);
        }
    }

    [Theory]
    [InlineData(1e-3)]
    [InlineData(1e4)]
    public void Size_scales_the_mesh_and_does_not_change_it(double scale)
    {
        Mesh plain = Mesher.Build(Deck(new() { ["panel"] = Rectangle(3, 1, 300, 4) })).Mesh;
        Mesh scaled = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(3 * scale, scale, 300 * scale, 4 * scale) })).Mesh;
        Assert.Equal(plain.NodeCount, scaled.NodeCount);
        for (int i = 0; i < plain.NodeCount; i++)
            Close.To(plain.X[i] * scale, scaled.X[i], 1e-12);
    }

    [Fact]
    public void A_finer_place_has_its_length_and_neighbours_grow_by_the_ratio()
    {
        ElementsDeck elements = new() { Finer = [new FinerDeck { From = 40, To = 60, Length = 0.5 }], Growth = 1.2 };
        Mesh mesh = MeshFacts.Check(Deck(new() { ["panel"] = Rectangle(0, 0, 200, 4, elements) })).Mesh;
        MeshedEdge top = mesh.Adherends[0].Edges["top"];
        double[] lengths = MeshFacts.Lengths(mesh, top);
        for (int i = 0; i < lengths.Length; i++)
        {
            double middle = (top.Arc[2 * i] + top.Arc[2 * i + 2]) / 2;
            if (middle is > 40 and < 60)
                Close.To(0.5, lengths[i], 1e-9);
            Assert.True(lengths[i] <= 6 * (1 + 1e-9));
            if (i > 0)
                Assert.True(Math.Max(lengths[i] / lengths[i - 1], lengths[i - 1] / lengths[i]) <= 1.2 * (1 + 1e-8));
        }
        Assert.True(lengths.Max() > 4, "the division grows up to the order of the thickness");
    }

    [Fact]
    public void A_strip_that_can_yield_gets_six_elements_through_unless_told_otherwise()
    {
        MaterialDeck metal = MeshDecks.Steel with { YieldCurve = new YieldCurveDeck { PlasticStrain = [0], Stress = [300] } };
        foreach ((ElementsDeck? elements, int expected) in ((ElementsDeck?, int)[])[(null, 6), (new ElementsDeck { Through = 3 }, 3)])
        {
            Deck deck = Deck(new() { ["arm"] = Rectangle(0, 0, 100, 4, elements) });
            Assert.Equal(expected, Mesher.Build(deck with { Materials = new Dictionary<string, MaterialDeck> { ["steel"] = metal } }).Mesh.Adherends[0].ElementsThrough);
        }
    }

    [Fact]
    public void An_upright_rectangle_gets_elements_of_good_shape()
    {
        foreach (ElementKind kind in new[] { ElementKind.EightNode, ElementKind.FourNode })
        {
            Mesh mesh = MeshFacts.Check(Deck(new() { ["post"] = Rectangle(0, 0, 5, 100) }, kind: kind)).Mesh;
            MeshedAdherend post = mesh.Adherends[0];
            double aspect = 5.0 / post.ElementsAlong / (100.0 / post.ElementsThrough);
            Assert.InRange(aspect, 0.3, 3);
        }
    }

    [Fact]
    public void Wrong_rectangles_and_numbers_are_refused()
    {
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 0) }), "adherends.a.rectangle.size", "greater than 0");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(double.NaN, 0, 10, 1) }), "adherends.a.rectangle.corner");
        MeshFacts.Refused(Deck(new() { ["a"] = new AdherendDeck { Of = "steel" } }), "adherends.a", "rectangle", "sheet");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 5, new ElementsDeck { Along = 1, Through = 1 }) }), "adherends.a.elements", "single eight-node");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 5000, 1, new ElementsDeck { Along = 1, Through = 4 }) }), "adherends.a", "times as long as wide");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 1e7, 1) }), "adherends.a", "elements would be needed");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 1e5, 1e5, new ElementsDeck { Along = 1000000, Through = 4 }) }), "adherends.a", "nodes; 2000000 are possible");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 1, new ElementsDeck { Along = 5, Length = 1 }) }), "adherends.a.elements.along", "leave out");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 1, new ElementsDeck { Finer = [new FinerDeck { From = 5, To = 12, Length = 1 }] }) }), "adherends.a.elements.finer.1.to", "beyond");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 1) }, grips: new() { ["g"] = new GripDeck { On = ["top of a"], At = new EdgePoint(double.NaN, 11) } }), "grips.g.at", "11 mm lies beyond");
        MeshFacts.Refused(Deck(new() { ["a"] = Rectangle(0, 0, 10, 1) }, grips: new() { ["g"] = new GripDeck { On = ["crown of a"] } }), "grips.g.on", "no edge \"crown\"");
    }

    [Fact]
    public void All_wrong_shapes_are_reported_at_once()
    {
        DeckProblem[] problems = MeshFacts.Refusal(Deck(new() { ["a"] = Rectangle(0, 0, 10, -1), ["b"] = Rectangle(0, 0, 10, 1), ["c"] = Sheet(2, null, [[0, 0], [10, 0], [10, 20]]) }));
        Assert.Equal(["adherends.a.rectangle.size", "adherends.c.sheet"], problems.Select(p => p.Path));
    }
}
