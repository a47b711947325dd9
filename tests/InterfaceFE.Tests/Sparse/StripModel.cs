namespace InterfaceFE.Tests.Sparse;

/// <summary>
/// Two arms of rectangular plane-strain elements (4 or 8 nodes, unit modulus) with a layer of springs between them. A pair of coincident nodes is one vertex with four
/// unknowns (lower x and y, upper x and y). The left end is supported or not; the right end's outer corners are root vertices.
/// </summary>
internal sealed class StripModel
{
    private readonly int _columns;
    private readonly int _rows;
    private readonly bool _quadratic;
    private readonly bool _supported;
    private readonly double _height;
    private readonly Dictionary<(int, int), int> _lower = [];
    private readonly Dictionary<(int, int), int> _upper = [];

    public StripModel(int columns, int rows, bool quadratic = false, double penalty = 1, bool supported = true, bool grips = true, double aspect = 1)
    {
        _columns = columns;
        _rows = rows;
        _quadratic = quadratic;
        _supported = supported;
        _height = aspect;
        Grips = grips;
        AddVertices();
        AddSolids();
        AddLayer(penalty);
    }

    public SparseModel Model { get; } = new();

    public bool Grips { get; }

    public List<int> LayerSlots { get; } = [];

    private int Step => _quadratic ? 2 : 1;

    /// <summary>Layer matrix of a 4- or 6-node slot with the given stiffness per area in the normal direction; half of it in the tangential one.</summary>
    public double[] LayerMatrix(double stiffness)
    {
        int pairs = _quadratic ? 3 : 2, m = 4 * pairs;
        double[][] mass = _quadratic
            ? [[4, 2, -1], [2, 16, 2], [-1, 2, 4]]
            : [[2, 1], [1, 2]];
        double divisor = _quadratic ? 30 : 6;
        var matrix = new double[m * m];
        for (int a = 0; a < pairs; a++)
            for (int b = 0; b < pairs; b++)
                for (int d = 0; d < 2; d++)
                {
                    double value = mass[a][b] / divisor * stiffness * (d == 0 ? 0.5 : 1);
                    matrix[(4 * a + d) * m + 4 * b + d] += value;
                    matrix[(4 * a + d) * m + 4 * b + 2 + d] -= value;
                    matrix[(4 * a + 2 + d) * m + 4 * b + d] -= value;
                    matrix[(4 * a + 2 + d) * m + 4 * b + 2 + d] += value;
                }
        return matrix;
    }

    private void AddVertices()
    {
        int last = _columns * Step, top = _rows * Step;
        for (int i = 0; i <= last; i++)
            for (int j = -top; j <= top; j++)
            {
                if (_quadratic && (i & 1) == 1 && (j & 1) == 1)
                    continue;
                bool held = _supported && i == 0, root = Grips && i == last && Math.Abs(j) == top;
                double x = (double)i / Step, y = (double)j / Step * _height;
                if (j == 0)
                {
                    int first = Model.Vertex(x, y, held ? 0 : 4, root, changeable: true);
                    _lower[(i, 0)] = held ? -1 : first;
                    _upper[(i, 0)] = held ? -1 : first + 2;
                }
                else
                    (j < 0 ? _lower : _upper)[(i, j)] = Model.Vertex(x, y, held ? 0 : 2, root) is int v && held ? -1 : v;
            }
    }

    private void AddSolids()
    {
        double[] stiffness = SolidMatrix();
        (int, int)[] nodes = _quadratic
            ? [(0, 0), (2, 0), (2, 2), (0, 2), (1, 0), (2, 1), (1, 2), (0, 1)]
            : [(0, 0), (1, 0), (1, 1), (0, 1)];
        for (int i = 0; i < _columns; i++)
            for (int j = -_rows; j < _rows; j++)
            {
                var unknowns = new int[2 * nodes.Length];
                for (int a = 0; a < nodes.Length; a++)
                {
                    (int, int) node = (i * Step + nodes[a].Item1, j * Step + nodes[a].Item2);
                    int first = (j < 0 ? _lower : _upper)[node];
                    unknowns[2 * a] = first;
                    unknowns[2 * a + 1] = first < 0 ? -1 : first + 1;
                }
                Model.Slot(unknowns, stiffness);
            }
    }

    private void AddLayer(double penalty)
    {
        double[] matrix = LayerMatrix(penalty);
        for (int i = 0; i < _columns; i++)
        {
            var unknowns = new List<int>();
            for (int k = 0; k <= Step; k++)
                for (int d = 0; d < 4; d++)
                    unknowns.Add(_lower[(i * Step + k, 0)] is int first and >= 0 ? first + d : -1);
            LayerSlots.Add(Model.Slot(unknowns.ToArray(), matrix));
        }
    }

    /// <summary>Plane strain, modulus 1, Poisson's ratio 0.3, 3×3 Gauss points on a rectangle 1 × height.</summary>
    private double[] SolidMatrix()
    {
        int nodes = _quadratic ? 8 : 4, m = 2 * nodes;
        double nu = 0.3, factor = 1 / ((1 + nu) * (1 - 2 * nu)), c11 = factor * (1 - nu), c12 = factor * nu, c33 = 0.5 / (1 + nu);
        double[] points = [-Math.Sqrt(0.6), 0, Math.Sqrt(0.6)], weights = [5.0 / 9, 8.0 / 9, 5.0 / 9];
        var matrix = new double[m * m];
        for (int p = 0; p < 9; p++)
        {
            double r = points[p / 3], s = points[p % 3], weight = weights[p / 3] * weights[p % 3] * _height / 4;
            (double[] dr, double[] ds) = Slopes(r, s);
            for (int a = 0; a < nodes; a++)
                for (int b = 0; b < nodes; b++)
                {
                    double ax = 2 * dr[a], ay = 2 * ds[a] / _height, bx = 2 * dr[b], by = 2 * ds[b] / _height;
                    matrix[2 * a * m + 2 * b] += weight * (ax * c11 * bx + ay * c33 * by);
                    matrix[2 * a * m + 2 * b + 1] += weight * (ax * c12 * by + ay * c33 * bx);
                    matrix[(2 * a + 1) * m + 2 * b] += weight * (ay * c12 * bx + ax * c33 * by);
                    matrix[(2 * a + 1) * m + 2 * b + 1] += weight * (ay * c11 * by + ax * c33 * bx);
                }
        }
        return matrix;
    }

    private (double[] R, double[] S) Slopes(double r, double s)
    {
        double[] x = [-1, 1, 1, -1, 0, 1, 0, -1], y = [-1, -1, 1, 1, -1, 0, 1, 0];
        int nodes = _quadratic ? 8 : 4;
        double[] dr = new double[nodes], ds = new double[nodes];
        for (int a = 0; a < nodes; a++)
        {
            if (!_quadratic)
                (dr[a], ds[a]) = (x[a] * (1 + y[a] * s) / 4, y[a] * (1 + x[a] * r) / 4);
            else if (a < 4)
                (dr[a], ds[a]) = (x[a] * (1 + y[a] * s) * (2 * x[a] * r + y[a] * s) / 4, y[a] * (1 + x[a] * r) * (2 * y[a] * s + x[a] * r) / 4);
            else if (x[a] == 0)
                (dr[a], ds[a]) = (-r * (1 + y[a] * s), y[a] * (1 - r * r) / 2);
            else
                (dr[a], ds[a]) = (x[a] * (1 - s * s) / 2, -s * (1 + x[a] * r));
        }
        return (dr, ds);
    }
}
