namespace InterfaceFE.Benchmarks.Models;

/// <summary>A place in the plane [mm].</summary>
/// <param name="X">x.</param>
/// <param name="Y">y.</param>
public readonly record struct Place(double X, double Y);

/// <summary>
/// Builds benchmark meshes from four-sided patches that share the nodes of common sides within a sheet, and from straight interfaces along x between sheets.
/// </summary>
/// <param name="nodesPerSolid">4 or 8.</param>
public sealed class MeshBuilder(int nodesPerSolid)
{
    // Places that agree to this many parts of a millimetre are one.
    private const double PartsPerMillimetre = 1e6;

    private readonly List<double> _x = [];
    private readonly List<double> _y = [];
    private readonly List<int> _solids = [];
    private readonly List<int> _layers = [];
    private readonly List<BenchmarkJoint> _joints = [];
    private readonly HashSet<int> _supported = [];
    private readonly List<int> _gripped = [];
    private readonly Dictionary<(int Sheet, long X, long Y), int> _nodes = [];

    private int NodesPerFace => nodesPerSolid == 4 ? 2 : 3;

    /// <summary>Adds a patch of elements; its map is bilinear.</summary>
    /// <param name="sheet">Sheet that it belongs to.</param>
    /// <param name="corners">Four corners, counter-clockwise.</param>
    /// <param name="along">Elements from corner 0 to corner 1.</param>
    /// <param name="across">Elements from corner 1 to corner 2.</param>
    public void AddPatch(int sheet, ReadOnlySpan<Place> corners, int along, int across)
    {
        for (int i = 0; i < along; i++)
            for (int j = 0; j < across; j++)
            {
                AddNode(sheet, corners, i, j, along, across);
                AddNode(sheet, corners, i + 1, j, along, across);
                AddNode(sheet, corners, i + 1, j + 1, along, across);
                AddNode(sheet, corners, i, j + 1, along, across);
                if (nodesPerSolid != 8)
                    continue;
                AddNode(sheet, corners, i + 0.5, j, along, across);
                AddNode(sheet, corners, i + 1, j + 0.5, along, across);
                AddNode(sheet, corners, i + 0.5, j + 1, along, across);
                AddNode(sheet, corners, i, j + 0.5, along, across);
            }
    }

    /// <summary>Adds a joint along x between two sheets whose nodes face each other there.</summary>
    /// <param name="lower">Sheet below.</param>
    /// <param name="upper">Sheet above.</param>
    /// <param name="start">Start of the joint, its lower x.</param>
    /// <param name="length">Length [mm].</param>
    /// <param name="count">Layer elements.</param>
    /// <param name="unbonded">Elements at the start that are a crack.</param>
    /// <exception cref="InvalidOperationException">A sheet has no node where one is needed.</exception>
    public void AddJoint(int lower, int upper, Place start, double length, int count, int unbonded)
    {
        _joints.Add(new BenchmarkJoint(_layers.Count / (2 * NodesPerFace), count, unbonded, length / count));
        for (int i = 0; i < count; i++)
            foreach (int sheet in (ReadOnlySpan<int>)[lower, upper])
                for (int k = 0; k < NodesPerFace; k++)
                    _layers.Add(Find(sheet, new Place(start.X + length * (i + (double)k / (NodesPerFace - 1)) / count, start.Y)));
    }

    /// <summary>Supports all nodes with a given x in both directions.</summary>
    public void SupportAt(double x)
    {
        for (int node = 0; node < _x.Count; node++)
            if (Math.Abs(_x[node] - x) * PartsPerMillimetre < 1)
                _supported.Add(node);
    }

    /// <summary>Lets a grip move a node along y.</summary>
    /// <exception cref="InvalidOperationException">The sheet has no node there.</exception>
    public void Grip(int sheet, Place place) => _gripped.Add(Find(sheet, place));

    /// <summary>The mesh as it now stands.</summary>
    public BenchmarkMesh Build(string name)
    {
        var isSupported = new bool[_x.Count];
        foreach (int node in _supported)
            isSupported[node] = true;
        return new BenchmarkMesh
        {
            Name = name,
            NodesPerSolid = nodesPerSolid,
            X = [.. _x],
            Y = [.. _y],
            Solids = [.. _solids],
            Layers = [.. _layers],
            Joints = [.. _joints],
            IsSupported = isSupported,
            Gripped = [.. _gripped],
        };
    }

    private static (int Sheet, long X, long Y) Key(int sheet, Place place) =>
        (sheet, (long)Math.Round(place.X * PartsPerMillimetre), (long)Math.Round(place.Y * PartsPerMillimetre));

    private int Find(int sheet, Place place) => _nodes.TryGetValue(Key(sheet, place), out int node)
        ? node
        : throw new InvalidOperationException(string.Create(System.Globalization.CultureInfo.InvariantCulture, $"sheet {sheet} has no node at ({place.X} mm, {place.Y} mm)"));

    private void AddNode(int sheet, ReadOnlySpan<Place> corners, double i, double j, int along, int across)
    {
        double s = i / along, t = j / across;
        Place place = new(
            (1 - t) * ((1 - s) * corners[0].X + s * corners[1].X) + t * (s * corners[2].X + (1 - s) * corners[3].X),
            (1 - t) * ((1 - s) * corners[0].Y + s * corners[1].Y) + t * (s * corners[2].Y + (1 - s) * corners[3].Y));
        (int, long, long) key = Key(sheet, place);
        if (!_nodes.TryGetValue(key, out int node))
        {
            node = _x.Count;
            _nodes.Add(key, node);
            _x.Add(place.X);
            _y.Add(place.Y);
        }
        _solids.Add(node);
    }
}
