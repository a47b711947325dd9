using System.Globalization;
using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Model;

/// <summary>
/// How nodal displacements follow from the unknowns. A node has unknowns of its own unless it belongs to a rigid body; then ux = Ux - θ·(y - yp) and uy = Uy + θ·(x - xp)
/// with the body's unknowns (Ux, Uy, θ) and pin (xp, yp), or with finite rotation ux = Ux + (cos θ - 1)·(x - xp) - sin θ·(y - yp) and uy = Uy + sin θ·(x - xp) + (cos θ - 1)·(y - yp). Unknowns are grouped in vertices: the coincident nodes of a joint are one vertex, a body is one.
/// Everything that a deck grips is a root vertex, and so are the crosshead of each load train and the elongation of a group of adherends out of plane, where there is one. The constructor throws <see cref="ArgumentException"/> when bodies overlap.
/// </summary>
public sealed class UnknownMap
{
    private readonly Mesh _mesh;
    private readonly IReadOnlyList<GripBody> _bodies;
    private readonly int[] _ofNode;
    private readonly int[] _bodyOfNode;
    private readonly int[] _ofBody;
    private readonly int[] _ofCrosshead;

    /// <summary>Numbers the unknowns of a mesh with the given bodies.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="bodies">What grips hold.</param>
    /// <param name="outOfPlane">Groups that strain out of plane together; null: none does.</param>
    /// <param name="turns">Whether rotations are finite.</param>
    /// <param name="loadTrains">Springs between grips and crossheads; null: none.</param>
    public UnknownMap(Mesh mesh, IReadOnlyList<GripBody> bodies, OutOfPlaneGroups? outOfPlane = null, bool turns = false, IReadOnlyList<LoadTrain>? loadTrains = null)
    {
        LoadTrains = loadTrains ??= [];
        OutOfPlane = outOfPlane;
        _mesh = mesh;
        _bodies = bodies;
        Turns = turns;
        _ofNode = new int[mesh.NodeCount];
        _bodyOfNode = new int[mesh.NodeCount];
        _ofBody = new int[bodies.Count];
        Array.Fill(_ofNode, -1);
        Array.Fill(_bodyOfNode, -1);

        var grippedBy = new int[mesh.NodeCount];
        Array.Fill(grippedBy, -1);
        for (int b = 0; b < bodies.Count; b++)
        {
            foreach (int node in bodies[b].Nodes)
            {
                if (bodies[b].Rigid && (_bodyOfNode[node] >= 0 || grippedBy[node] >= 0) || !bodies[b].Rigid && _bodyOfNode[node] >= 0)
                {
                    int other = _bodyOfNode[node] >= 0 ? _bodyOfNode[node] : grippedBy[node];
                    throw new ArgumentException(string.Create(CultureInfo.InvariantCulture,
                        $"'{bodies[b].Name}' and '{bodies[other].Name}' share the point ({mesh.X[node]:G6} mm, {mesh.Y[node]:G6} mm) although one of them is rigid: a point can belong to one rigid grip only"));
                }
                if (bodies[b].Rigid)
                    _bodyOfNode[node] = b;
                else
                    grippedBy[node] = b;
            }
        }

        int[] group = GroupPairs(mesh);
        var nodesOfGroup = new Dictionary<int, List<int>>();
        var order = new List<int>();
        for (int node = 0; node < mesh.NodeCount; node++)
        {
            if (_bodyOfNode[node] >= 0)
                continue;
            int g = Find(group, node);
            if (!nodesOfGroup.TryGetValue(g, out List<int>? list))
            {
                nodesOfGroup.Add(g, list = []);
                order.Add(g);
            }
            list.Add(node);
        }

        var paired = new bool[mesh.NodeCount];
        foreach (MeshedJoint joint in mesh.Joints)
        {
            foreach (int node in joint.LowerNodes)
                paired[node] = true;
            foreach (int node in joint.UpperNodes)
                paired[node] = true;
        }

        var vertexOfUnknown = new List<int>(2 * mesh.NodeCount);
        var x = new List<double>();
        var y = new List<double>();
        var root = new List<bool>();
        var changeable = new List<bool>();
        foreach (int g in order)
        {
            List<int> nodes = nodesOfGroup[g];
            bool isRoot = false, isChangeable = false;
            foreach (int node in nodes)
            {
                _ofNode[node] = vertexOfUnknown.Count;
                vertexOfUnknown.Add(x.Count);
                vertexOfUnknown.Add(x.Count);
                isRoot |= grippedBy[node] >= 0;
                isChangeable |= paired[node];
            }
            x.Add(mesh.X[nodes[0]]);
            y.Add(mesh.Y[nodes[0]]);
            root.Add(isRoot);
            changeable.Add(isChangeable);
        }
        for (int b = 0; b < bodies.Count; b++)
        {
            if (!bodies[b].Rigid)
            {
                _ofBody[b] = -1;
                continue;
            }
            _ofBody[b] = vertexOfUnknown.Count;
            for (int i = 0; i < 3; i++)
                vertexOfUnknown.Add(x.Count);
            x.Add(bodies[b].PinX);
            y.Add(bodies[b].PinY);
            root.Add(true);
            changeable.Add(false);
        }
        _ofCrosshead = new int[loadTrains.Count];
        for (int t = 0; t < loadTrains.Count; t++)
        {
            _ofCrosshead[t] = vertexOfUnknown.Count;
            vertexOfUnknown.Add(x.Count);
            x.Add(bodies[loadTrains[t].Body].PinX);
            y.Add(bodies[loadTrains[t].Body].PinY);
            root.Add(true);
            changeable.Add(false);
        }
        FirstOutOfPlane = vertexOfUnknown.Count;
        for (int tied = 0; tied < (outOfPlane?.Count ?? 0); tied++)
        {
            int node = mesh.Adherends[outOfPlane!.FirstOf(tied)].FirstNode;
            vertexOfUnknown.Add(x.Count);
            x.Add(mesh.X[node]);
            y.Add(mesh.Y[node]);
            root.Add(true);
            changeable.Add(false);
        }
        VertexOfUnknown = [.. vertexOfUnknown];
        VertexX = [.. x];
        VertexY = [.. y];
        IsRoot = [.. root];
        IsChangeable = [.. changeable];
    }

    /// <summary>Whether rotations of rigid bodies are finite.</summary>
    public bool Turns { get; }

    /// <summary>Number of unknowns.</summary>
    public int Count => VertexOfUnknown.Length;

    /// <summary>Vertex of each unknown.</summary>
    public int[] VertexOfUnknown { get; }

    /// <summary>x of each vertex [mm].</summary>
    public double[] VertexX { get; }

    /// <summary>y of each vertex [mm].</summary>
    public double[] VertexY { get; }

    /// <summary>Whether each vertex belongs to the root (grips).</summary>
    public bool[] IsRoot { get; }

    /// <summary>Whether element matrices at a vertex can change.</summary>
    public bool[] IsChangeable { get; }

    /// <summary>Groups that strain out of plane together; null when none does.</summary>
    public OutOfPlaneGroups? OutOfPlane { get; }

    /// <summary>Unknown of the first group out of plane: its elongation over <see cref="OutOfPlaneGroups.Length"/> [mm]; those of further groups follow, last of all.</summary>
    public int FirstOutOfPlane { get; }

    /// <summary>The unknown with which an adherend strains out of plane; null when it does not.</summary>
    public OutOfPlaneLink? LinkOf(int adherend) => OutOfPlane is { } groups ? new OutOfPlaneLink(FirstOutOfPlane + groups.Of(adherend), groups.Length) : null;

    /// <summary>Strain out of plane of an adherend; 0 where none is unknown.</summary>
    public double OutOfPlaneStrain(int adherend, ReadOnlySpan<double> unknowns) => OutOfPlane is { } groups ? unknowns[FirstOutOfPlane + groups.Of(adherend)] / groups.Length : 0;

    /// <summary>First of the three unknowns of a rigid body; -1 for a body of points.</summary>
    public int OfBody(int body) => _ofBody[body];

    /// <summary>Unknown of a component of a body: of the rigid body, or of the first node of a body of points, which has x and y alone.</summary>
    public int OfBody(int body, GripComponent component) => (_bodies[body].Rigid ? _ofBody[body] : _ofNode[_bodies[body].Nodes[0]]) + (int)component;

    /// <summary>The load trains.</summary>
    public IReadOnlyList<LoadTrain> LoadTrains { get; }

    /// <summary>Unknown of the crosshead of a load train.</summary>
    public int OfCrosshead(LoadTrain loadTrain) => _ofCrosshead[LoadTrains.ToList().FindIndex(t => ReferenceEquals(t, loadTrain))];

    /// <summary>Unknown of ux of a node (uy is the next one); -1 when the node follows a rigid body.</summary>
    public int OfNode(int node) => _ofNode[node];

    /// <summary>The rigid body that a node follows; -1 when it has unknowns of its own.</summary>
    public int BodyOfNode(int node) => _bodyOfNode[node];

    /// <summary>The bodies.</summary>
    public IReadOnlyList<GripBody> Bodies => _bodies;

    /// <summary>Displacement of a node [mm].</summary>
    public (double X, double Y) Displacement(int node, ReadOnlySpan<double> unknowns)
    {
        int body = _bodyOfNode[node];
        if (body < 0)
            return (unknowns[_ofNode[node]], unknowns[_ofNode[node] + 1]);
        int first = _ofBody[body];
        double rotation = unknowns[first + 2], armX = _mesh.X[node] - _bodies[body].PinX, armY = _mesh.Y[node] - _bodies[body].PinY;
        if (!Turns)
            return (unknowns[first] - rotation * armY, unknowns[first + 1] + rotation * armX);
        (double x, double y) = Turned(armX, armY, rotation);
        return (unknowns[first] + x, unknowns[first + 1] + y);
    }

    /// <summary>Displacement of the end of an arm that turns about its start by a finite angle [mm].</summary>
    /// <param name="armX">Arm along x [mm].</param>
    /// <param name="armY">Arm along y [mm].</param>
    /// <param name="angle">Angle, counter-clockwise [rad].</param>
    internal static (double X, double Y) Turned(double armX, double armY, double angle)
    {
        double sine = Math.Sin(angle), half = Math.Sin(0.5 * angle), less = 2 * half * half;
        return (-less * armX - sine * armY, sine * armX - less * armY);
    }

    /// <summary>Says in words what an unknown is, for messages: adherend, place, direction.</summary>
    public string Describe(int unknown)
    {
        for (int b = 0; b < _bodies.Count; b++)
        {
            if (_ofBody[b] >= 0 && unknown >= _ofBody[b] && unknown < _ofBody[b] + 3)
            {
                string what = (unknown - _ofBody[b]) switch { 0 => "along x", 1 => "along y", _ => "by rotation" };
                return string.Create(CultureInfo.InvariantCulture, $"the grip on {_bodies[b].Name} ({_bodies[b].PinX:G6} mm, {_bodies[b].PinY:G6} mm), {what}");
            }
        }
        int train = Array.IndexOf(_ofCrosshead, unknown);
        if (train >= 0)
            return $"the crosshead of the grip on {_bodies[LoadTrains[train].Body].Name}, along {(LoadTrains[train].Component == GripComponent.X ? "x" : "y")}";
        if (unknown >= FirstOutOfPlane)
            return $"the elongation out of plane of '{_mesh.Adherends[OutOfPlane!.FirstOf(unknown - FirstOutOfPlane)].Name}' and what is bonded to it";
        int node = Array.FindIndex(_ofNode, first => first >= 0 && (first == unknown || first + 1 == unknown));
        MeshedAdherend adherend = _mesh.Adherends.First(a => node >= a.FirstNode && node < a.FirstNode + a.NodeCount);
        return string.Create(CultureInfo.InvariantCulture, $"adherend '{adherend.Name}' at ({_mesh.X[node]:G6} mm, {_mesh.Y[node]:G6} mm), along {(unknown == _ofNode[node] ? "x" : "y")}");
    }

    private static int[] GroupPairs(Mesh mesh)
    {
        var parent = new int[mesh.NodeCount];
        for (int i = 0; i < parent.Length; i++)
            parent[i] = i;
        foreach (MeshedJoint joint in mesh.Joints)
        {
            for (int i = 0; i < joint.LowerNodes.Length; i++)
            {
                int a = Find(parent, joint.LowerNodes[i]), b = Find(parent, joint.UpperNodes[i]);
                parent[Math.Max(a, b)] = Math.Min(a, b);
            }
        }
        return parent;
    }

    private static int Find(int[] parent, int node)
    {
        while (parent[node] != node)
        {
            parent[node] = parent[parent[node]];
            node = parent[node];
        }
        return node;
    }
}
