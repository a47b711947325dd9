using InterfaceFE.Decks;
using InterfaceFE.Geometry;

namespace InterfaceFE.Results;

/// <summary>
/// Reads the virtual gauges of a deck. At small rotation a clip gauge reads the change of distance along the line of its undeformed points; with finite rotation the change of the
/// distance itself, and an inclinometer the angle.
/// </summary>
public sealed class GaugeReader
{
    private readonly Mesh _mesh;
    private readonly bool _turns;
    private readonly List<(GaugeKind Kind, int A, int B)> _gauges = [];

    /// <summary>Finds the nodes of the gauges.</summary>
    /// <exception cref="DeckException">A gauge has no place on the mesh.</exception>
    public GaugeReader(Deck deck, Mesh mesh)
    {
        _mesh = mesh;
        _turns = deck.Model.Rotation == RotationSetting.Finite;
        var finder = new EdgeFinder(mesh);
        var infos = new List<GaugeInfo>();
        foreach ((string name, GaugeDeck gauge) in deck.Keep?.Gauges ?? new Dictionary<string, GaugeDeck>())
        {
            string path = $"keep.gauges.{name}";
            MeshedEdge edge = finder.Find(gauge.On, $"{path}.on").Edge;
            int at = edge.Nearest(gauge.At.On(edge.Length));
            if (gauge.Kind == GaugeKind.ClipGauge)
            {
                MeshedEdge other = finder.Find(gauge.To ?? gauge.On, $"{path}.to").Edge;
                int to = other.Nearest((gauge.ToAt ?? gauge.At).On(other.Length));
                if (edge.Nodes[at] == other.Nodes[to])
                    throw new DeckException(path, "both points of the clip gauge are the same point of the mesh");
                _gauges.Add((gauge.Kind, edge.Nodes[at], other.Nodes[to]));
            }
            else
                _gauges.Add((gauge.Kind, edge.Nodes[Math.Max(at - 1, 0)], edge.Nodes[Math.Min(at + 1, edge.Nodes.Length - 1)]));
            infos.Add(new GaugeInfo(name, gauge.Kind switch { GaugeKind.ClipGauge => "mm", GaugeKind.Inclinometer => "rad", _ => "-" }));
        }
        Gauges = infos;
    }

    /// <summary>The gauges.</summary>
    public IReadOnlyList<GaugeInfo> Gauges { get; }

    /// <summary>Readings: mm, rad or strain.</summary>
    /// <param name="ux">Displacement of nodes along x [mm].</param>
    /// <param name="uy">Displacement of nodes along y [mm].</param>
    public IReadOnlyList<double> Read(double[] ux, double[] uy)
    {
        var readings = new double[_gauges.Count];
        for (int i = 0; i < readings.Length; i++)
        {
            (GaugeKind kind, int a, int b) = _gauges[i];
            double dx = _mesh.X[b] - _mesh.X[a], dy = _mesh.Y[b] - _mesh.Y[a], length = Math.Sqrt(dx * dx + dy * dy);
            double along, across;
            if (_turns)
            {
                double nowX = dx + ux[b] - ux[a], nowY = dy + uy[b] - uy[a];
                along = Math.Sqrt(nowX * nowX + nowY * nowY) - length;
                readings[i] = kind switch { GaugeKind.ClipGauge => along, GaugeKind.Inclinometer => Math.Atan2(dx * nowY - dy * nowX, dx * nowX + dy * nowY), _ => along / length };
                continue;
            }
            if (length > 0)
            {
                along = ((ux[b] - ux[a]) * dx + (uy[b] - uy[a]) * dy) / length;
                across = ((uy[b] - uy[a]) * dx - (ux[b] - ux[a]) * dy) / length;
            }
            else
            {
                // Facing points of a closed joint: the line of the gauge is across it.
                along = uy[b] - uy[a];
                across = 0;
            }
            readings[i] = kind switch { GaugeKind.ClipGauge => along, GaugeKind.Inclinometer => across / length, _ => along / length };
        }
        return readings;
    }
}
