using InterfaceFE.Geometry;
using InterfaceFE.Mechanics.Layers;

namespace InterfaceFE.Model;

/// <summary>
/// Pressure on an edge of an adherend, positive towards the body: load = -∫ N·p·n·b ds with the outward normal n. With finite rotation n and ds are those of the deformed edge (a
/// follower load), and the tangent is skew where the edge ends free; at small rotation the load stays that on the shape before deformation. The width is that before deformation. Forces
/// are written with the sign of internal ones, so that they count against the load. It stores and spends nothing.
/// </summary>
public sealed class PressureBlock : IElementBlock
{
    private static readonly double[] Places = [-1 / Math.Sqrt(3), 1 / Math.Sqrt(3)];

    private readonly int[] _nodes;
    private readonly double[] _coordinates, _levels;
    private readonly double _width, _sense;
    private readonly bool _turns;

    /// <summary>Makes the block of an edge.</summary>
    /// <param name="name">The edge in words.</param>
    /// <param name="mesh">The mesh.</param>
    /// <param name="adherend">Index of the adherend.</param>
    /// <param name="edge">The edge.</param>
    /// <param name="levels">Pressure before the first stage and at the end of each [MPa].</param>
    /// <param name="turns">Whether rotations are finite.</param>
    public PressureBlock(string name, Mesh mesh, int adherend, MeshedEdge edge, double[] levels, bool turns)
    {
        Name = name;
        Adherend = adherend;
        _levels = levels;
        _width = mesh.Adherends[adherend].Width;
        _turns = turns;
        NodesPerElement = mesh.NodesPerFace;
        int step = NodesPerElement - 1;
        Count = (edge.Nodes.Length - 1) / step;
        _nodes = new int[Count * NodesPerElement];
        for (int e = 0; e < Count; e++)
            edge.Nodes.AsSpan(e * step, NodesPerElement).CopyTo(_nodes.AsSpan(e * NodesPerElement, NodesPerElement));
        _coordinates = [.. _nodes.SelectMany(node => new[] { mesh.X[node], mesh.Y[node] })];
        _sense = OutwardSense(mesh, mesh.Adherends[adherend], edge);
    }

    /// <inheritdoc/>
    public string Name { get; }

    /// <summary>Index of the adherend.</summary>
    public int Adherend { get; }

    /// <inheritdoc/>
    public int Count { get; }

    /// <inheritdoc/>
    public int NodesPerElement { get; }

    /// <inheritdoc/>
    public int NativeCount => 2 * NodesPerElement;

    /// <inheritdoc/>
    public int OutOfPlaneUnknown => -1;

    /// <inheritdoc/>
    public int StateSize => 0;

    /// <inheritdoc/>
    public TangentKind Kind => _turns ? TangentKind.Unsymmetric : TangentKind.Constant;

    /// <inheritdoc/>
    public ReadOnlySpan<int> Nodes(int element) => _nodes.AsSpan(element * NodesPerElement, NodesPerElement);

    /// <summary>Pressure at a place on the path [MPa].</summary>
    public double Pressure(in PathPoint at) => _levels[at.Stage - 1] + at.Progress * (_levels[at.Stage] - _levels[at.Stage - 1]);

    /// <summary>As <see cref="IElementBlock.Evaluate"/>; the load rate is that by the stage's progress instead of by temperature.</summary>
    public ElementAnswer Evaluate(int element, in PathPoint at, ReadOnlySpan<double> displacement, ReadOnlySpan<double> accepted, Span<double> tentative, Wanted wanted, in ElementBuffers into)
    {
        int n = NodesPerElement, size = 2 * n;
        double pressure = Pressure(at), rate = _levels[at.Stage] - _levels[at.Stage - 1];
        ReadOnlySpan<double> x = _coordinates.AsSpan(element * size, size);
        Span<double> shapes = stackalloc double[3], slopes = stackalloc double[3], byPressure = stackalloc double[6];
        byPressure.Clear();
        bool tangent = (wanted & Wanted.Tangent) != 0;
        if (tangent)
            into.Tangent.Clear();
        foreach (double xi in Places)
        {
            LayerRule.Shape(xi, shapes[..n], slopes[..n]);
            double alongX = 0, alongY = 0;
            for (int a = 0; a < n; a++)
            {
                alongX += slopes[a] * (x[2 * a] + (_turns ? displacement[2 * a] : 0));
                alongY += slopes[a] * (x[2 * a + 1] + (_turns ? displacement[2 * a + 1] : 0));
            }
            for (int a = 0; a < n; a++)
            {
                double share = _sense * _width * shapes[a];
                byPressure[2 * a] += share * alongY;
                byPressure[2 * a + 1] -= share * alongX;
                for (int b = 0; b < n && tangent && _turns; b++)
                {
                    into.Tangent[2 * a * size + 2 * b + 1] += pressure * share * slopes[b];
                    into.Tangent[(2 * a + 1) * size + 2 * b] -= pressure * share * slopes[b];
                }
            }
        }
        for (int i = 0; i < size; i++)
        {
            into.Force[i] = pressure * byPressure[i];
            if ((wanted & Wanted.LoadRate) != 0)
                into.LoadRate[i] = rate * byPressure[i];
        }
        if ((wanted & Wanted.Dissipation) != 0)
            into.Dissipation.Clear();
        return default;
    }

    /// <summary>1 where the quarter turn clockwise of the edge's way leads out of the body, else -1.</summary>
    private static double OutwardSense(Mesh mesh, MeshedAdherend adherend, MeshedEdge edge)
    {
        int start = edge.Nodes[0], end = edge.Nodes[mesh.NodesPerFace - 1], per = mesh.NodesPerSolid;
        for (int e = 0; e < adherend.Connectivity.Length / per; e++)
        {
            ReadOnlySpan<int> nodes = adherend.Connectivity.AsSpan(e * per, per);
            if (!nodes.Contains(start) || !nodes.Contains(end))
                continue;
            double x = 0, y = 0;
            for (int i = 0; i < 4; i++)
            {
                x += 0.25 * mesh.X[nodes[i]];
                y += 0.25 * mesh.Y[nodes[i]];
            }
            double alongX = mesh.X[end] - mesh.X[start], alongY = mesh.Y[end] - mesh.Y[start];
            return alongX * (y - mesh.Y[start]) - alongY * (x - mesh.X[start]) > 0 ? 1 : -1;
        }
        throw new ArgumentException("no element lies at the edge", nameof(edge));
    }
}
