using InterfaceFE.Geometry;
using InterfaceFE.Results;

namespace InterfaceFE.Reports;

/// <summary>Turns mesh, displacement and a nodal field into triangles, outlines, hatching and layer stretches in mm.</summary>
internal sealed class ModelPicture
{
    private readonly Mesh _mesh;
    private readonly double[] _x;
    private readonly double[] _y;

    /// <summary>Places of the nodes with the displacement enlarged.</summary>
    /// <param name="mesh">The mesh.</param>
    /// <param name="fields">Fields; null: as built.</param>
    /// <param name="enlarged">How many times larger displacements are shown.</param>
    public ModelPicture(Mesh mesh, FieldSnapshot? fields, double enlarged)
    {
        _mesh = mesh;
        _x = [.. mesh.X];
        _y = [.. mesh.Y];
        for (int i = 0; i < _x.Length && fields is not null; i++)
        {
            _x[i] += enlarged * fields.DisplacementX[i];
            _y[i] += enlarged * fields.DisplacementY[i];
        }
    }

    /// <summary>Box around all nodes; not finite when a place is not.</summary>
    public Limits Box => new(_x.Min(), _x.Max(), _y.Min(), _y.Max());

    /// <summary>Place of a node.</summary>
    public (double X, double Y) Place(int node) => (_x[node], _y[node]);

    /// <summary>Picture with colours by a nodal field between bounds.</summary>
    public Picture Coloured(double[] values, double least, double largest, ColourMap map, FieldSnapshot fields)
    {
        List<float> x = [], y = [], place = [];
        int cuts = Cuts();
        foreach (MeshedAdherend adherend in _mesh.Adherends)
            ForEachElement(adherend, nodes => Triangles(nodes, cuts, values, least, largest, x, y, place));
        return new Picture
        {
            TriangleX = [.. x],
            TriangleY = [.. y],
            TrianglePlace = [.. place],
            Map = map,
            Hatched = Yielded(fields),
            Outlines = Outlines(),
            Layers = Layers(fields),
        };
    }

    /// <summary>Picture with each adherend in a tint of its own; layers bonded or not.</summary>
    public Picture Tinted()
    {
        List<float> x = [], y = [], place = [];
        List<uint> colours = [];
        double[] nothing = new double[_x.Length];
        for (int a = 0; a < _mesh.Adherends.Count; a++)
        {
            ForEachElement(_mesh.Adherends[a], nodes => Triangles(nodes, 1, nothing, 0, 1, x, y, place));
            while (colours.Count < x.Count / 3)
                colours.Add(Style.Tints[a % Style.Tints.Length]);
        }
        return new Picture
        {
            TriangleX = [.. x],
            TriangleY = [.. y],
            TrianglePlace = [.. place],
            Map = ColourMap.Batlow,
            TriangleColour = [.. colours],
            Outlines = Outlines(),
            Layers = Layers(null),
        };
    }

    /// <summary>Elements are cut finer in small meshes, where each covers many dots.</summary>
    private int Cuts()
    {
        int elements = _mesh.Adherends.Sum(adherend => adherend.Connectivity.Length / _mesh.NodesPerSolid);
        return elements <= 4000 ? 4 : elements <= 40000 ? 2 : 1;
    }

    private void ForEachElement(MeshedAdherend adherend, Action<int[]> visit)
    {
        int per = _mesh.NodesPerSolid;
        for (int first = 0; first < adherend.Connectivity.Length; first += per)
            visit(adherend.Connectivity[first..(first + per)]);
    }

    private void Triangles(int[] nodes, int cuts, double[] values, double least, double largest, List<float> x, List<float> y, List<float> place)
    {
        int side = cuts + 1;
        Span<float> px = stackalloc float[side * side], py = stackalloc float[side * side], pv = stackalloc float[side * side];
        Span<double> shape = stackalloc double[nodes.Length];
        for (int j = 0; j < side; j++)
        {
            for (int i = 0; i < side; i++)
            {
                Shapes(-1 + 2.0 * i / cuts, -1 + 2.0 * j / cuts, shape);
                double sx = 0, sy = 0, sv = 0;
                for (int k = 0; k < nodes.Length; k++)
                {
                    sx += shape[k] * _x[nodes[k]];
                    sy += shape[k] * _y[nodes[k]];
                    sv += shape[k] * values[nodes[k]];
                }
                px[j * side + i] = (float)sx;
                py[j * side + i] = (float)sy;
                pv[j * side + i] = (float)((sv - least) / (largest - least));
            }
        }
        ReadOnlySpan<int> corners = [0, 1, side + 1, 0, side + 1, side];
        for (int j = 0; j < cuts; j++)
        {
            for (int i = 0; i < cuts; i++)
            {
                foreach (int corner in corners)
                {
                    int k = j * side + i + corner;
                    x.Add(px[k]);
                    y.Add(py[k]);
                    place.Add(pv[k]);
                }
            }
        }
    }

    /// <summary>Shape functions of the bilinear or the eight-node quadrilateral (corners counter-clockwise, then middles from side 0-1).</summary>
    private static void Shapes(double r, double s, Span<double> shape)
    {
        ReadOnlySpan<double> cornerR = [-1, 1, 1, -1], cornerS = [-1, -1, 1, 1];
        for (int k = 0; k < 4; k++)
        {
            double rr = r * cornerR[k], ss = s * cornerS[k];
            shape[k] = 0.25 * (1 + rr) * (1 + ss) * (shape.Length == 8 ? rr + ss - 1 : 1);
        }
        if (shape.Length == 4)
            return;
        shape[4] = 0.5 * (1 - r * r) * (1 - s);
        shape[5] = 0.5 * (1 + r) * (1 - s * s);
        shape[6] = 0.5 * (1 - r * r) * (1 + s);
        shape[7] = 0.5 * (1 - r) * (1 - s * s);
    }

    private List<Polyline> Yielded(FieldSnapshot fields)
    {
        List<Polyline> areas = [];
        foreach (MeshedAdherend adherend in _mesh.Adherends)
        {
            ForEachElement(adherend, nodes =>
            {
                double mean = 0;
                for (int k = 0; k < 4; k++)
                    mean += 0.25 * fields.PlasticStrain[nodes[k]];
                if (mean > 1e-6)
                    areas.Add(Around(nodes));
            });
        }
        return areas;
    }

    private Polyline Around(int[] nodes)
    {
        List<double> x = [], y = [];
        for (int side = 0; side < 4; side++)
            AddSide(nodes, side, x, y);
        return new Polyline([.. x], [.. y]);
    }

    /// <summary>Points of a side from its start up to, not including, its end; a quadratic side as four straight pieces.</summary>
    private void AddSide(int[] nodes, int side, List<double> x, List<double> y)
    {
        int from = nodes[side], to = nodes[(side + 1) % 4];
        if (nodes.Length == 4)
        {
            x.Add(_x[from]);
            y.Add(_y[from]);
            return;
        }
        int middle = nodes[4 + side];
        for (int i = 0; i < 4; i++)
        {
            double t = i / 4.0, a = (1 - t) * (1 - 2 * t), b = 4 * t * (1 - t), c = t * (2 * t - 1);
            x.Add(a * _x[from] + b * _x[middle] + c * _x[to]);
            y.Add(a * _y[from] + b * _y[middle] + c * _y[to]);
        }
    }

    /// <summary>Sides that belong to one element of their adherend only.</summary>
    private List<Polyline> Outlines()
    {
        List<Polyline> lines = [];
        foreach (MeshedAdherend adherend in _mesh.Adherends)
        {
            Dictionary<(int, int), (int[] Nodes, int Side)> open = [];
            ForEachElement(adherend, nodes =>
            {
                for (int side = 0; side < 4; side++)
                {
                    int a = nodes[side], b = nodes[(side + 1) % 4];
                    (int, int) key = (Math.Min(a, b), Math.Max(a, b));
                    if (!open.Remove(key))
                        open.Add(key, (nodes, side));
                }
            });
            foreach ((int[] nodes, int side) in open.Values)
            {
                List<double> x = [], y = [];
                AddSide(nodes, side, x, y);
                x.Add(_x[nodes[(side + 1) % 4]]);
                y.Add(_y[nodes[(side + 1) % 4]]);
                lines.Add(new Polyline([.. x], [.. y]));
            }
        }
        return lines;
    }

    /// <summary>Stretches of neighbouring elements in the same state.</summary>
    private List<LayerStretch> Layers(FieldSnapshot? fields)
    {
        List<LayerStretch> stretches = [];
        int per = _mesh.NodesPerFace;
        for (int j = 0; j < _mesh.Joints.Count; j++)
        {
            MeshedJoint joint = _mesh.Joints[j];
            LayerField? layer = fields?.Layers.FirstOrDefault(one => one.Joint == j);
            int from = 0;
            for (int e = 1; e <= joint.ElementCount; e++)
            {
                if (e < joint.ElementCount && StateOf(joint, layer, e, per) == StateOf(joint, layer, from, per))
                    continue;
                int first = from * per, count = (e - from) * per;
                stretches.Add(new LayerStretch(StateOf(joint, layer, from, per), Line(joint.LowerNodes.AsSpan(first, count)), Line(joint.UpperNodes.AsSpan(first, count))));
                from = e;
            }
        }
        return stretches;
    }

    private static LayerState StateOf(MeshedJoint joint, LayerField? layer, int element, int per)
    {
        if (!joint.Bonded[element])
            return LayerState.Separated;
        double damage = 0;
        for (int k = 0; k < per && layer is not null; k++)
            damage = Math.Max(damage, layer.Damage[element * per + k]);
        return damage >= 1 ? LayerState.Separated : damage > 0 ? LayerState.Softening : LayerState.Intact;
    }

    private Polyline Line(ReadOnlySpan<int> nodes)
    {
        double[] x = new double[nodes.Length], y = new double[nodes.Length];
        for (int i = 0; i < nodes.Length; i++)
            (x[i], y[i]) = (_x[nodes[i]], _y[nodes[i]]);
        return new Polyline(x, y);
    }
}
