namespace InterfaceFE.Benchmarks.Models;

/// <summary>A joint of a benchmark mesh: a run of layer elements, from its start to its end.</summary>
/// <param name="FirstElement">First layer element.</param>
/// <param name="Count">Number of layer elements.</param>
/// <param name="FirstBonded">First bonded element, counted from the joint's start; those before it are a starter crack that stands open.</param>
/// <param name="ElementLength">Length of an element [mm].</param>
public readonly record struct BenchmarkJoint(int FirstElement, int Count, int FirstBonded, double ElementLength)
{
    /// <summary>Number of bonded elements.</summary>
    public int Bonded => Count - FirstBonded;
}

/// <summary>
/// Bonded sheets of plane elements with layer elements of zero thickness between them. Facing nodes coincide and are a pair. Immutable by convention.
/// </summary>
public sealed class BenchmarkMesh
{
    /// <summary>Short name, as in the figures' names.</summary>
    public required string Name { get; init; }

    /// <summary>Nodes of a solid element, 4 or 8: corners counter-clockwise, then mid-sides.</summary>
    public required int NodesPerSolid { get; init; }

    /// <summary>x of each node [mm].</summary>
    public required double[] X { get; init; }

    /// <summary>y of each node [mm].</summary>
    public required double[] Y { get; init; }

    /// <summary>Nodes of the solid elements, element after element.</summary>
    public required int[] Solids { get; init; }

    /// <summary>Nodes of the layer elements: the lower face from start to end, then the upper one.</summary>
    public required int[] Layers { get; init; }

    /// <summary>The joints, in the order of their layer elements.</summary>
    public required BenchmarkJoint[] Joints { get; init; }

    /// <summary>Whether each node is supported in both directions.</summary>
    public required bool[] IsSupported { get; init; }

    /// <summary>Nodes that a grip moves along y.</summary>
    public required int[] Gripped { get; init; }

    /// <summary>Nodes of a face of a layer element.</summary>
    public int NodesPerFace => NodesPerSolid == 4 ? 2 : 3;

    /// <summary>Number of solid elements.</summary>
    public int SolidCount => Solids.Length / NodesPerSolid;

    /// <summary>Number of layer elements.</summary>
    public int LayerCount => Layers.Length / (2 * NodesPerFace);

    /// <summary>Nodes of a solid element.</summary>
    public ReadOnlySpan<int> SolidNodes(int element) => Solids.AsSpan(element * NodesPerSolid, NodesPerSolid);

    /// <summary>Nodes of a layer element.</summary>
    public ReadOnlySpan<int> LayerNodes(int element) => Layers.AsSpan(element * 2 * NodesPerFace, 2 * NodesPerFace);

    /// <summary>x of the middle of an element's nodes [mm].</summary>
    public double MiddleX(ReadOnlySpan<int> nodes)
    {
        double sum = 0;
        foreach (int node in nodes)
            sum += X[node];
        return sum / nodes.Length;
    }
}
