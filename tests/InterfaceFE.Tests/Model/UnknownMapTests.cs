using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Model;
using Xunit;

namespace InterfaceFE.Tests.Model;

public class UnknownMapTests
{
    [Fact]
    public void Nodes_of_a_rigid_body_follow_translation_and_rotation_about_its_pin()
    {
        // Source: rigid body kinematics for small rotation, u = U + θ × r.
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s", moreGrips: "  end: {on: left end of lower, from: 1 mm, to: 2 mm, pin: [-3 mm, 7 mm]}").Replace("base: {on: bottom of lower}", "base: {on: right end of lower}", StringComparison.Ordinal)));
        UnknownMap map = model.Unknowns;
        int body = model.Grips.First(g => g.Name == "end").Bodies[0];
        Assert.Equal((-3.0, 7.0), (map.Bodies[body].PinX, map.Bodies[body].PinY));
        var unknowns = new double[map.Count];
        (unknowns[map.OfBody(body)], unknowns[map.OfBody(body) + 1], unknowns[map.OfBody(body) + 2]) = (0.4, -0.2, 0.05);
        foreach (int node in map.Bodies[body].Nodes)
        {
            (double x, double y) = map.Displacement(node, unknowns);
            Close.To(0.4 - 0.05 * (model.Mesh.Y[node] - 7), x, 1e-15);
            Close.To(-0.2 + 0.05 * (model.Mesh.X[node] + 3), y, 1e-15);
            Assert.Equal((body, -1), (map.BodyOfNode(node), map.OfNode(node)));
        }
    }

    [Fact]
    public void Every_node_has_two_unknowns_or_a_body_and_facing_nodes_share_a_vertex()
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s", elements: "eight-node", moreGrips: "  side: {on: left end of upper, at: 1 mm}")));
        UnknownMap map = model.Unknowns;
        int[] used = new int[map.Count];
        for (int node = 0; node < model.Mesh.NodeCount; node++)
        {
            Assert.True((map.OfNode(node) >= 0) ^ (map.BodyOfNode(node) >= 0));
            for (int i = 0; map.OfNode(node) >= 0 && i < 2; i++)
                used[map.OfNode(node) + i]++;
        }
        for (int b = 0; b < map.Bodies.Count; b++)
            for (int i = 0; map.OfBody(b) >= 0 && i < 3; i++)
                used[map.OfBody(b) + i]++;
        Assert.All(used, count => Assert.Equal(1, count));
        MeshedJoint joint = model.Mesh.Joints[0];
        for (int i = 0; i < joint.LowerNodes.Length; i++)
        {
            int vertex = map.VertexOfUnknown[map.OfNode(joint.LowerNodes[i])];
            Assert.Equal(vertex, map.VertexOfUnknown[map.OfNode(joint.UpperNodes[i]) + 1]);
            Assert.True(map.IsChangeable[vertex]);
        }
        foreach (GripBody body in map.Bodies)
            Assert.True(map.IsRoot[map.VertexOfUnknown[body.Rigid ? map.OfBody(Array.IndexOf([.. map.Bodies], body)) : map.OfNode(body.Nodes[0])]]);
    }

    [Fact]
    public void Unknowns_are_described_by_adherend_place_and_direction()
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s")));
        UnknownMap map = model.Unknowns;
        int node = model.Mesh.Joints[0].UpperNodes[0];
        Assert.Equal("adherend 'upper' at (0 mm, 2 mm), along y", map.Describe(map.OfNode(node) + 1));
        Assert.Equal("the grip on top of upper (3 mm, 4 mm), by rotation", map.Describe(map.OfBody(model.Grips[1].Bodies[0]) + 2));
    }

    [Theory]
    [InlineData(true, true)]
    [InlineData(true, false)]
    [InlineData(false, true)]
    public void Bodies_that_share_a_point_are_refused_when_one_is_rigid(bool firstRigid, bool secondRigid)
    {
        Mesh mesh = HandMesh.Make(false, 0).Mesh;
        GripBody[] bodies = [Body("first", firstRigid, 0, 1), Body("second", secondRigid, 1, 2)];
        string message = Assert.Throws<ArgumentException>(() => new UnknownMap(mesh, bodies)).Message;
        Assert.Contains("'first'", message, StringComparison.Ordinal);
        Assert.Contains("'second'", message, StringComparison.Ordinal);
        Assert.Contains("rigid", message, StringComparison.Ordinal);
    }

    [Fact]
    public void Bodies_of_points_may_share_a_point()
    {
        Mesh mesh = HandMesh.Make(false, 0).Mesh;
        var map = new UnknownMap(mesh, [Body("first", false, 0, 1), Body("second", false, 1, 2)]);
        Assert.Equal(2 * mesh.NodeCount, map.Count);
        Assert.Equal(-1, map.OfBody(0));
    }

    private static GripBody Body(string name, bool rigid, params int[] nodes) => new() { Name = name, Rigid = rigid, Nodes = nodes, PinX = 0, PinY = 0 };
}
