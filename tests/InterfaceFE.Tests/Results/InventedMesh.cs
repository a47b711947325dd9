using InterfaceFE.Geometry;

namespace InterfaceFE.Tests.Results;

/// <summary>Builds small meshes for tests of writers and figures: strips along a line, and joints between facing faces.</summary>
internal sealed class InventedMesh(bool quadratic)
{
    private static readonly IReadOnlyDictionary<string, MeshedEdge> NoEdges = new Dictionary<string, MeshedEdge>();
    private readonly List<double> _x = [], _y = [];
    private readonly List<MeshedAdherend> _adherends = [];
    private readonly List<MeshedJoint> _joints = [];
    private readonly List<int[]> _bottoms = [], _tops = [];
    private readonly int _half = quadratic ? 2 : 1;

    /// <summary>A strip of even thickness whose lower face runs through the given points; corners are mitred.</summary>
    public InventedMesh Strip(string name, double thickness, int through, params (double X, double Y)[] line)
    {
        int along = line.Length - 1, rows = _half * through, columns = _half * along, first = _x.Count;
        int[][] node = [.. Enumerable.Range(0, columns + 1).Select(_ => new int[rows + 1])];
        for (int i = 0; i <= columns; i++)
        {
            for (int j = 0; j <= rows; j++)
            {
                if (_half == 2 && i % 2 == 1 && j % 2 == 1)
                    continue;
                (double x, double y, double nx, double ny) = At(line, (double)i / _half);
                double height = thickness * j / rows;
                node[i][j] = _x.Count;
                _x.Add(x + nx * height);
                _y.Add(y + ny * height);
            }
        }

        List<int> connectivity = [];
        for (int e = 0; e < along; e++)
        {
            for (int t = 0; t < through; t++)
            {
                int a = _half * e, b = a + _half, c = _half * t, d = c + _half;
                connectivity.AddRange([node[a][c], node[b][c], node[b][d], node[a][d]]);
                if (_half == 2)
                    connectivity.AddRange([node[a + 1][c], node[b][c + 1], node[a + 1][d], node[a][c + 1]]);
            }
        }
        _bottoms.Add([.. Enumerable.Range(0, columns + 1).Select(i => node[i][0])]);
        _tops.Add([.. Enumerable.Range(0, columns + 1).Select(i => node[i][rows])]);
        _adherends.Add(new MeshedAdherend
        {
            Name = name,
            Material = "invented",
            Width = 20,
            Thickness = thickness,
            Connectivity = [.. connectivity],
            FirstNode = first,
            NodeCount = _x.Count - first,
            ElementsAlong = along,
            ElementsThrough = through,
            Edges = NoEdges,
            StraightAlongX = line.All(p => p.Y == line[0].Y),
        });
        return this;
    }

    /// <summary>A joint from the top of one strip to the bottom of another, over a number of elements from given columns on.</summary>
    public InventedMesh Joint(string name, int lower, int upper, int lowerColumn, int upperColumn, int elements, Func<double, bool> bonded)
    {
        List<int> below = [], above = [];
        double[] position = new double[elements + 1];
        bool[] isBonded = new bool[elements];
        for (int e = 0; e < elements; e++)
        {
            for (int k = 0; k <= _half; k++)
            {
                below.Add(_tops[lower][_half * (lowerColumn + e) + k]);
                above.Add(_bottoms[upper][_half * (upperColumn + e) + k]);
            }
            int from = below[^(_half + 1)], to = below[^1];
            position[e + 1] = position[e] + double.Hypot(_x[to] - _x[from], _y[to] - _y[from]);
            isBonded[e] = bonded(0.5 * (position[e] + position[e + 1]));
        }
        _joints.Add(new MeshedJoint
        {
            Name = name,
            Layer = "tape",
            Width = 20,
            UpperAdherend = upper,
            LowerAdherend = lower,
            LowerNodes = [.. below],
            UpperNodes = [.. above],
            Bonded = isBonded,
            Position = position,
            OnePercentLength = 0.8,
            ProcessZoneEstimate = 8,
        });
        return this;
    }

    public Mesh Build() => new() { X = [.. _x], Y = [.. _y], NodesPerSolid = _half == 2 ? 8 : 4, Adherends = _adherends, Joints = _joints };

    /// <summary>Points from one place to another, both included.</summary>
    public static IEnumerable<(double X, double Y)> Run((double X, double Y) from, (double X, double Y) to, int pieces) =>
        Enumerable.Range(0, pieces + 1).Select(i => (from.X + (to.X - from.X) * i / pieces, from.Y + (to.Y - from.Y) * i / pieces));

    private static (double X, double Y, double Nx, double Ny) At((double X, double Y)[] line, double s)
    {
        int i = Math.Min((int)s, line.Length - 2);
        double share = s - i;
        (double px, double py) = Miter(line, i);
        (double qx, double qy) = Miter(line, i + 1);
        return (line[i].X + share * (line[i + 1].X - line[i].X), line[i].Y + share * (line[i + 1].Y - line[i].Y), px + share * (qx - px), py + share * (qy - py));
    }

    private static (double X, double Y) Miter((double X, double Y)[] line, int i)
    {
        (double ax, double ay) = Normal(line[Math.Max(i - 1, 0)], line[Math.Max(i, 1)]);
        (double bx, double by) = Normal(line[Math.Min(i, line.Length - 2)], line[Math.Min(i + 1, line.Length - 1)]);
        double scale = 1 / (1 + ax * bx + ay * by);
        return ((ax + bx) * scale, (ay + by) * scale);
    }

    private static (double X, double Y) Normal((double X, double Y) from, (double X, double Y) to)
    {
        double length = double.Hypot(to.X - from.X, to.Y - from.Y);
        return (-(to.Y - from.Y) / length, (to.X - from.X) / length);
    }
}
