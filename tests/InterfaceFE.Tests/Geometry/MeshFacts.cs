using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using Xunit;

namespace InterfaceFE.Tests.Geometry;

/// <summary>What must hold for every mesh, checked from coordinates alone.</summary>
internal static class MeshFacts
{
    /// <summary>Checks numbering, orientation, edges and pairs; gives the mesh back.</summary>
    public static MeshingResult Check(Deck deck)
    {
        MeshingResult result = Mesher.Build(deck);
        Mesh mesh = result.Mesh;
        int next = 0;
        foreach (MeshedAdherend adherend in mesh.Adherends)
        {
            Assert.Equal(next, adherend.FirstNode);
            next += adherend.NodeCount;
            CheckAdherend(mesh, adherend);
        }
        Assert.Equal(next, mesh.NodeCount);
        foreach (MeshedJoint joint in mesh.Joints)
            CheckJoint(mesh, joint);
        return result;
    }

    /// <summary>Area by integrating the determinant with 3 by 3 Gauss points, all of which must be positive.</summary>
    public static double Area(Mesh mesh, MeshedAdherend adherend)
    {
        double g = Math.Sqrt(0.6);
        double[] at = [-g, 0, g];
        double[] weight = [5.0 / 9, 8.0 / 9, 5.0 / 9];
        double area = 0;
        int per = mesh.NodesPerSolid;
        for (int e = 0; e < adherend.Connectivity.Length; e += per)
            for (int i = 0; i < 3; i++)
                for (int j = 0; j < 3; j++)
                {
                    double det = Determinant(mesh, adherend.Connectivity.AsSpan(e, per), at[i], at[j]);
                    Assert.True(det > 0, $"determinant {det} in element {e / per} of {adherend.Name}");
                    area += weight[i] * weight[j] * det;
                }
        return area;
    }

    /// <summary>Determinant of the map by differences of its shape functions' sums, written apart from the mesher's own.</summary>
    private static double Determinant(Mesh mesh, ReadOnlySpan<int> nodes, double xi, double eta)
    {
        const double Step = 0.25;
        // Differences of a polynomial of degree two are exact at any step.
        (double x1, double y1) = Map(mesh, nodes, xi + Step, eta);
        (double x0, double y0) = Map(mesh, nodes, xi - Step, eta);
        (double x3, double y3) = Map(mesh, nodes, xi, eta + Step);
        (double x2, double y2) = Map(mesh, nodes, xi, eta - Step);
        return ((x1 - x0) * (y3 - y2) - (x3 - x2) * (y1 - y0)) / (4 * Step * Step);
    }

    private static (double X, double Y) Map(Mesh mesh, ReadOnlySpan<int> nodes, double xi, double eta)
    {
        double[] a = [-1, 1, 1, -1, 0, 1, 0, -1];
        double[] b = [-1, -1, 1, 1, -1, 0, 1, 0];
        double x = 0;
        double y = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            double n;
            if (i >= 4)
                n = a[i] == 0 ? (1 - xi * xi) * (1 + b[i] * eta) / 2 : (1 - eta * eta) * (1 + a[i] * xi) / 2;
            else if (nodes.Length == 8)
                n = (1 + a[i] * xi) * (1 + b[i] * eta) * (a[i] * xi + b[i] * eta - 1) / 4;
            else
                n = (1 + a[i] * xi) * (1 + b[i] * eta) / 4;
            x += n * mesh.X[nodes[i]];
            y += n * mesh.Y[nodes[i]];
        }
        return (x, y);
    }

    private static void CheckAdherend(Mesh mesh, MeshedAdherend adherend)
    {
        int per = mesh.NodesPerSolid;
        Assert.Equal(adherend.ElementsAlong * adherend.ElementsThrough * per, adherend.Connectivity.Length);
        HashSet<int> used = [.. adherend.Connectivity];
        Assert.Equal(adherend.NodeCount, used.Count);
        Assert.Equal(adherend.FirstNode, used.Min());
        Assert.Equal(adherend.FirstNode + adherend.NodeCount - 1, used.Max());
        double area = Area(mesh, adherend);
        Assert.True(area > 0);
        foreach ((string name, MeshedEdge edge) in adherend.Edges)
        {
            Assert.Equal(edge.Nodes.Length, edge.Arc.Length);
            Assert.Equal(0, edge.Arc[0]);
            double chord = 0;
            for (int i = 1; i < edge.Nodes.Length; i++)
            {
                Assert.True(edge.Arc[i] > edge.Arc[i - 1], $"{name} of {adherend.Name}: arc does not rise at {i}");
                chord += Distance(mesh, edge.Nodes[i - 1], edge.Nodes[i]);
            }
            // Chords between neighbouring nodes of a bend with 4 elements or more per right angle are short of the arc by less than 1 %.
            Close.To(edge.Length, chord, 0.02, 0, $"{name} of {adherend.Name}");
            (int a, int b) = (edge.Nodes[0], edge.Nodes[^1]);
            bool upright = Math.Abs(mesh.X[a] - mesh.X[b]) <= 1e-6 * adherend.Thickness;
            Assert.True(upright ? mesh.Y[a] < mesh.Y[b] : mesh.X[a] < mesh.X[b], $"{name} of {adherend.Name} starts at the wrong end");
        }
    }

    private static void CheckJoint(Mesh mesh, MeshedJoint joint)
    {
        int per = mesh.NodesPerFace;
        Assert.Equal(joint.ElementCount * per, joint.LowerNodes.Length);
        Assert.Equal(joint.ElementCount * per, joint.UpperNodes.Length);
        Assert.Equal(joint.ElementCount + 1, joint.Position.Length);
        Assert.Equal(0, joint.Position[0]);
        MeshedAdherend upper = mesh.Adherends[joint.UpperAdherend];
        MeshedAdherend lower = mesh.Adherends[joint.LowerAdherend];
        for (int i = 0; i < joint.LowerNodes.Length; i++)
        {
            (int a, int b) = (joint.LowerNodes[i], joint.UpperNodes[i]);
            Assert.Equal(mesh.X[a], mesh.X[b]);
            Assert.Equal(mesh.Y[a], mesh.Y[b]);
            Assert.InRange(a, lower.FirstNode, lower.FirstNode + lower.NodeCount - 1);
            Assert.InRange(b, upper.FirstNode, upper.FirstNode + upper.NodeCount - 1);
        }
        for (int e = 0; e < joint.ElementCount; e++)
        {
            double start = mesh.X[joint.LowerNodes[e * per]];
            double end = mesh.X[joint.LowerNodes[e * per + per - 1]];
            Assert.True(end > start);
            Close.To(joint.Position[e] + mesh.X[joint.LowerNodes[0]], start, 1e-12, 1e-12);
            if (per == 3)
                Close.To((start + end) / 2, mesh.X[joint.LowerNodes[e * per + 1]], 1e-12, 1e-12);
            if (e > 0)
                Assert.Equal(joint.LowerNodes[e * per - 1], joint.LowerNodes[e * per]);
        }
        CheckFaces(mesh, lower, joint.LowerNodes, 1);
        CheckFaces(mesh, upper, joint.UpperNodes, -1);
    }

    /// <summary>Nodes of a joint are nodes of an edge of the body, whose centre lies on the right side of them.</summary>
    private static void CheckFaces(Mesh mesh, MeshedAdherend adherend, int[] nodes, int above)
    {
        Assert.Contains(adherend.Edges.Values, e => nodes.All(new HashSet<int>(e.Nodes).Contains));
        HashSet<int> onFace = [.. nodes];
        int per = mesh.NodesPerSolid;
        for (int e = 0; e < adherend.Connectivity.Length; e += per)
        {
            int[] element = adherend.Connectivity[e..(e + per)];
            if (element.Count(onFace.Contains) < 2)
                continue;
            double face = element.Where(onFace.Contains).Average(n => mesh.Y[n]);
            Assert.True(above * (face - element.Average(n => mesh.Y[n])) > 0, "the body lies on the wrong side of the joint");
        }
    }

    public static double Distance(Mesh mesh, int a, int b) => Math.Sqrt(Math.Pow(mesh.X[a] - mesh.X[b], 2) + Math.Pow(mesh.Y[a] - mesh.Y[b], 2));

    /// <summary>Lengths of the elements of an edge.</summary>
    public static double[] Lengths(Mesh mesh, MeshedEdge edge)
    {
        int step = mesh.NodesPerFace - 1;
        return [.. Enumerable.Range(0, (edge.Nodes.Length - 1) / step).Select(i => edge.Arc[(i + 1) * step] - edge.Arc[i * step])];
    }

    /// <summary>The problems that a deck is refused with.</summary>
    public static DeckProblem[] Refusal(Deck deck) => [.. Assert.Throws<DeckException>(() => Mesher.Build(deck)).Problems];

    /// <summary>Checks that a deck is refused at a path with words in the message.</summary>
    public static void Refused(Deck deck, string path, params string[] words)
    {
        DeckProblem[] problems = Refusal(deck);
        DeckProblem problem = Assert.Single(problems);
        Assert.Equal(path, problem.Path);
        foreach (string word in words)
            Assert.Contains(word, problem.Message, StringComparison.Ordinal);
        Assert.DoesNotContain('\n', problem.Message);
    }
}
