namespace InterfaceFE.Geometry;

/// <summary>
/// A plane mesh of adherends and the layers between them. Nodes of different adherends are never shared: facing faces of a joint have nodes of their own, coincident
/// or the layer's drawn thickness apart. Coordinates in mm, zero-based indices, counter-clockwise elements.
/// </summary>
public sealed class Mesh
{
    /// <summary>x of each node [mm].</summary>
    public required double[] X { get; init; }

    /// <summary>y of each node [mm].</summary>
    public required double[] Y { get; init; }

    /// <summary>Nodes per solid element: 8 (corners counter-clockwise, then the middle of each side from side 0-1) or 4.</summary>
    public required int NodesPerSolid { get; init; }

    /// <summary>Adherends in deck order.</summary>
    public required IReadOnlyList<MeshedAdherend> Adherends { get; init; }

    /// <summary>Joints in deck order.</summary>
    public required IReadOnlyList<MeshedJoint> Joints { get; init; }

    /// <summary>Number of nodes.</summary>
    public int NodeCount => X.Length;

    /// <summary>Area of an adherend, or of one row of its elements, by the corners of the elements [mm²].</summary>
    /// <param name="adherend">Index of the adherend.</param>
    /// <param name="row">Row from the bottom up; -1: all.</param>
    public double AreaOf(int adherend, int row = -1)
    {
        int[] nodes = Adherends[adherend].Connectivity;
        double area = 0;
        for (int e = 0; e < nodes.Length / NodesPerSolid; e++)
        {
            if (row >= 0 && e % Adherends[adherend].ElementsThrough != row)
                continue;
            (int a, int b, int c, int d) = (nodes[e * NodesPerSolid], nodes[e * NodesPerSolid + 1], nodes[e * NodesPerSolid + 2], nodes[e * NodesPerSolid + 3]);
            area += 0.5 * ((X[c] - X[a]) * (Y[d] - Y[b]) - (X[d] - X[b]) * (Y[c] - Y[a]));
        }
        return area;
    }

    /// <summary>Nodes of one face of a layer element: 3 (end, middle, end) or 2.</summary>
    public int NodesPerFace => NodesPerSolid == 8 ? 3 : 2;
}

/// <summary>Elements and edges of one adherend.</summary>
public sealed class MeshedAdherend
{
    /// <summary>Name in the deck.</summary>
    public required string Name { get; init; }

    /// <summary>Name of its material.</summary>
    public required string Material { get; init; }

    /// <summary>Width out of plane [mm].</summary>
    public required double Width { get; init; }

    /// <summary>Thickness in plane [mm]: height of a rectangle, thickness of a sheet.</summary>
    public required double Thickness { get; init; }

    /// <summary>Nodes of all elements, <see cref="Mesh.NodesPerSolid"/> each, element after element along, column by column from the left end, bottom up.</summary>
    public required int[] Connectivity { get; init; }

    /// <summary>First node; the nodes of an adherend are numbered without gap.</summary>
    public required int FirstNode { get; init; }

    /// <summary>Number of nodes.</summary>
    public required int NodeCount { get; init; }

    /// <summary>Elements along.</summary>
    public required int ElementsAlong { get; init; }

    /// <summary>Elements through the thickness.</summary>
    public required int ElementsThrough { get; init; }

    /// <summary>The ply, from the bottom up, in which each row of elements lies; empty for one material throughout.</summary>
    public IReadOnlyList<int> PlyOfRow { get; init; } = [];

    /// <summary>Edges by name (top, bottom, left end, right end; or upper face, lower face, and stretches).</summary>
    public required IReadOnlyDictionary<string, MeshedEdge> Edges { get; init; }

    /// <summary>Whether the adherend is straight and drawn towards +x, so that path integrals along it have their plain form.</summary>
    public required bool StraightAlongX { get; init; }
}

/// <summary>An edge: its nodes in order, with arc length from its start.</summary>
public sealed class MeshedEdge
{
    /// <summary>Nodes in order (middle nodes included), from the edge's start: lower x, or lower y for an upright end.</summary>
    public required int[] Nodes { get; init; }

    /// <summary>Arc length of each node from the edge's start [mm].</summary>
    public required double[] Arc { get; init; }

    /// <summary>Length of the edge [mm].</summary>
    public double Length => Arc[^1];

    /// <summary>Index into <see cref="Nodes"/> of the node nearest to a position [mm].</summary>
    public int Nearest(double position)
    {
        int best = 0;
        for (int i = 1; i < Arc.Length; i++)
            if (Math.Abs(Arc[i] - position) < Math.Abs(Arc[best] - position))
                best = i;
        return best;
    }
}

/// <summary>
/// Facing faces of one joint over their whole overlap, as a row of layer elements from the joint's start to its end. Elements with
/// <see cref="Bonded"/> false (starter crack, unbonded stretches) carry no traction but are listed, so that profiles cover the joint.
/// </summary>
public sealed class MeshedJoint
{
    /// <summary>Name in the deck.</summary>
    public required string Name { get; init; }

    /// <summary>Name of its layer.</summary>
    public required string Layer { get; init; }

    /// <summary>Width of the bond [mm].</summary>
    public required double Width { get; init; }

    /// <summary>Index of the adherend above.</summary>
    public required int UpperAdherend { get; init; }

    /// <summary>Index of the adherend below.</summary>
    public required int LowerAdherend { get; init; }

    /// <summary>Lower nodes of all elements, <see cref="Mesh.NodesPerFace"/> each (start, middle, end), element after element.</summary>
    public required int[] LowerNodes { get; init; }

    /// <summary>Upper nodes, paired with <see cref="LowerNodes"/> by index.</summary>
    public required int[] UpperNodes { get; init; }

    /// <summary>Whether each element is bonded.</summary>
    public required bool[] Bonded { get; init; }

    /// <summary>Position of the start of each element and, last, of the joint's end: arc length of the lower face from the joint's start [mm]; one more entry than elements.</summary>
    public required double[] Position { get; init; }

    /// <summary>Element length that gives about 1 % error by the formulas of DEVELOPERS.md, for the bonded part [mm].</summary>
    public required double OnePercentLength { get; init; }

    /// <summary>Estimated length of the process zone [mm].</summary>
    public required double ProcessZoneEstimate { get; init; }

    /// <summary>Number of elements.</summary>
    public int ElementCount => Bonded.Length;
}

/// <summary>Result of meshing: the mesh, and lines for the log that say which element lengths were chosen and why.</summary>
/// <param name="Mesh">The mesh.</param>
/// <param name="Notes">Lines for the log, without line breaks.</param>
/// <param name="Warnings">Warnings, for example an element length above the one for 1 %.</param>
public sealed record MeshingResult(Mesh Mesh, IReadOnlyList<string> Notes, IReadOnlyList<string> Warnings);
