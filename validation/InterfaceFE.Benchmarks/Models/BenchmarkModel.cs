using InterfaceFE.Sparse;

namespace InterfaceFE.Benchmarks.Models;

/// <summary>
/// A mesh with its unknowns, element slots and a state that a test passes through: the starter crack stands open, a process zone softens ahead of it, the rest is virgin.
/// Slots hold the solid elements first, then the layer elements. A coincident pair of nodes is one vertex; supported nodes have no unknowns; gripped ones are root vertices.
/// </summary>
public sealed class BenchmarkModel
{
    // [mm]; half a process zone, 0.82·l_c·l_s/(l_c + l_s), of the layer on 3 mm arms: the first half of the softening branch. Stays definite on the hat's thinner sheets.
    private const double ProcessZone = 2.5;

    private readonly ElementMatrices _matrices;
    private readonly int[] _unknownOfNode;

    /// <summary>Numbers the unknowns of a mesh and computes the matrices of its state.</summary>
    public BenchmarkModel(BenchmarkMesh mesh)
    {
        ArgumentNullException.ThrowIfNull(mesh);
        Mesh = mesh;
        _matrices = new ElementMatrices(mesh);
        _unknownOfNode = new int[mesh.X.Length];
        (int[] vertexOfUnknown, double[] x, double[] y, bool[] isRoot, bool[] isChangeable) = NumberUnknowns();
        var start = new List<int> { 0 };
        var unknowns = new List<int>();
        for (int e = 0; e < mesh.SolidCount; e++)
            AddSlot(mesh.SolidNodes(e), start, unknowns);
        for (int e = 0; e < mesh.LayerCount; e++)
            AddSlot(mesh.LayerNodes(e), start, unknowns);
        Pattern = new SlotPattern
        {
            UnknownCount = vertexOfUnknown.Length,
            VertexOfUnknown = vertexOfUnknown,
            VertexX = x,
            VertexY = y,
            IsRoot = isRoot,
            IsChangeable = isChangeable,
            SlotStart = [.. start],
            SlotUnknowns = [.. unknowns],
        };
        Held = [.. mesh.Gripped.Select(node => _unknownOfNode[node] + 1).Order()];
        Matrices = new double[Pattern.SlotCount][];
        for (int e = 0; e < mesh.SolidCount; e++)
            Matrices[e] = SolidMatrix(e, 0);
        foreach (BenchmarkJoint joint in mesh.Joints)
            for (int i = 0; i < joint.Count; i++)
                Matrices[mesh.SolidCount + joint.FirstElement + i] = LayerMatrix(joint.FirstElement + i, BaseLevel(joint, i));
    }

    /// <summary>The mesh.</summary>
    public BenchmarkMesh Mesh { get; }

    /// <summary>What the engine's analysis takes.</summary>
    public SlotPattern Pattern { get; }

    /// <summary>Matrix of each slot in the state; shared between like elements, not to be changed.</summary>
    public double[][] Matrices { get; }

    /// <summary>Unknowns that the grips hold, rising.</summary>
    public int[] Held { get; }

    /// <summary>Slot of a layer element.</summary>
    public int LayerSlot(int element) => Mesh.SolidCount + element;

    /// <summary>Matrix of a solid element's slot; supported unknowns left out.</summary>
    public double[] SolidMatrix(int element, int state) => Reduce(_matrices.Solid(element, state), Mesh.SolidNodes(element));

    /// <summary>Matrix of a layer element's slot; supported unknowns left out.</summary>
    public double[] LayerMatrix(int element, int level) => Reduce(_matrices.Layer(element, level), Mesh.LayerNodes(element));

    /// <summary>A right side that is not smooth: equally spread numbers between -1/2 and 1/2, the same each time.</summary>
    public double[] RightSide()
    {
        var b = new double[Pattern.UnknownCount];
        uint seed = 1;
        for (int i = 0; i < b.Length; i++)
        {
            seed = unchecked(seed * 1664525 + 1013904223);
            b[i] = (seed >> 8) / 16777216.0 - 0.5;
        }
        return b;
    }

    private static int BaseLevel(BenchmarkJoint joint, int element)
    {
        int behindTip = element - joint.FirstBonded;
        int zone = (int)(ProcessZone / joint.ElementLength);
        return behindTip < 0 ? ElementMatrices.OpenLevel : behindTip < zone ? (ElementMatrices.OpenLevel - 1) * (zone - behindTip) / zone : 0;
    }

    private (int[] VertexOfUnknown, double[] X, double[] Y, bool[] IsRoot, bool[] IsChangeable) NumberUnknowns()
    {
        var partner = new int[Mesh.X.Length];
        Array.Fill(partner, -1);
        int face = Mesh.NodesPerFace;
        for (int e = 0; e < Mesh.LayerCount; e++)
        {
            ReadOnlySpan<int> nodes = Mesh.LayerNodes(e);
            for (int k = 0; k < face; k++)
                (partner[nodes[k]], partner[nodes[face + k]]) = (nodes[face + k], nodes[k]);
        }
        var gripped = new HashSet<int>(Mesh.Gripped);
        List<int> vertexOfUnknown = [];
        List<double> x = [], y = [];
        List<bool> isRoot = [], isChangeable = [];
        for (int node = 0; node < partner.Length; node++)
        {
            if (partner[node] >= 0 && partner[node] < node)
                continue;
            Number(node);
            if (partner[node] >= 0)
                Number(partner[node]);
            isRoot.Add(gripped.Contains(node));
            isChangeable.Add(partner[node] >= 0);
            x.Add(Mesh.X[node]);
            y.Add(Mesh.Y[node]);
        }
        return ([.. vertexOfUnknown], [.. x], [.. y], [.. isRoot], [.. isChangeable]);

        void Number(int node)
        {
            _unknownOfNode[node] = Mesh.IsSupported[node] ? -1 : vertexOfUnknown.Count;
            for (int k = 0; k < 2 && !Mesh.IsSupported[node]; k++)
                vertexOfUnknown.Add(x.Count);
        }
    }

    private void AddSlot(ReadOnlySpan<int> nodes, List<int> start, List<int> unknowns)
    {
        foreach (int node in nodes)
            for (int k = 0; k < 2 && _unknownOfNode[node] >= 0; k++)
                unknowns.Add(_unknownOfNode[node] + k);
        start.Add(unknowns.Count);
    }

    private double[] Reduce(double[] matrix, ReadOnlySpan<int> nodes)
    {
        int size = 2 * nodes.Length;
        List<int> kept = [];
        for (int i = 0; i < size; i++)
            if (_unknownOfNode[nodes[i / 2]] >= 0)
                kept.Add(i);
        if (kept.Count == size)
            return matrix;
        var reduced = new double[kept.Count * kept.Count];
        for (int r = 0; r < kept.Count; r++)
            for (int c = 0; c < kept.Count; c++)
                reduced[r * kept.Count + c] = matrix[kept[r] * size + kept[c]];
        return reduced;
    }
}
