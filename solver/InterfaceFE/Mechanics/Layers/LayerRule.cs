namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Points along a layer element: positions ξ from -1 (start) to 1 (end), weights that sum to 2, and the shape functions of a face and their derivatives there. Immutable.
/// </summary>
public sealed class LayerRule
{
    private readonly double[] _positions;
    private readonly double[] _weights;
    private readonly double[] _shapes;
    private readonly double[] _slopes;

    private LayerRule(string name, int nodesPerFace, double[] positions, double[] weights)
    {
        if (nodesPerFace is not (2 or 3))
            throw new ArgumentOutOfRangeException(nameof(nodesPerFace), nodesPerFace, "nodesPerFace must be 2 or 3");
        Name = name;
        NodesPerFace = nodesPerFace;
        _positions = positions;
        _weights = weights;
        _shapes = new double[nodesPerFace * positions.Length];
        _slopes = new double[nodesPerFace * positions.Length];
        for (int p = 0; p < positions.Length; p++)
            Shape(positions[p], _shapes.AsSpan(p * nodesPerFace, nodesPerFace), _slopes.AsSpan(p * nodesPerFace, nodesPerFace));
    }

    /// <summary>Name of the rule in words.</summary>
    public string Name { get; }

    /// <summary>Nodes of a face: 3 (start, middle, end) or 2.</summary>
    public int NodesPerFace { get; }

    /// <summary>Number of points.</summary>
    public int Count => _positions.Length;

    /// <summary>Positions ξ in rising order.</summary>
    public ReadOnlySpan<double> Positions => _positions;

    /// <summary>Weights, sum 2.</summary>
    public ReadOnlySpan<double> Weights => _weights;

    /// <summary>Equal sub-intervals with two Gauss points each: the default, 10 of them. Integration error as measured, about 0.1 % at one process zone per element.</summary>
    /// <param name="nodesPerFace">3 or 2.</param>
    /// <param name="count">Sub-intervals, 1 to 1000.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public static LayerRule SubIntervals(int nodesPerFace, int count = 10)
    {
        if (count is < 1 or > 1000)
            throw new ArgumentOutOfRangeException(nameof(count), count, "count must lie between 1 and 1000");
        double[] positions = new double[2 * count], weights = new double[2 * count];
        double half = 1.0 / count, offset = half / Math.Sqrt(3);
        for (int i = 0; i < count; i++)
        {
            double middle = (2 * i + 1 - count) * half;
            positions[2 * i] = middle - offset;
            positions[2 * i + 1] = middle + offset;
            weights[2 * i] = weights[2 * i + 1] = half;
        }
        return new LayerRule("sub-intervals", nodesPerFace, positions, weights);
    }

    /// <summary>Plain Gauss rule with as many points as a face has nodes. Jagged from three quarters of a process zone.</summary>
    /// <param name="nodesPerFace">3 or 2.</param>
    /// <exception cref="ArgumentOutOfRangeException">Another number of nodes.</exception>
    public static LayerRule Gauss(int nodesPerFace) => nodesPerFace == 2
        ? new LayerRule("gauss", 2, [-1 / Math.Sqrt(3), 1 / Math.Sqrt(3)], [1, 1])
        : new LayerRule("gauss", nodesPerFace, [-Math.Sqrt(0.6), 0, Math.Sqrt(0.6)], [5.0 / 9, 8.0 / 9, 5.0 / 9]);

    /// <summary>Lobatto rule with its points at the nodes (Simpson, trapezoid). Needs shorter elements than the others.</summary>
    /// <param name="nodesPerFace">3 or 2.</param>
    /// <exception cref="ArgumentOutOfRangeException">Another number of nodes.</exception>
    public static LayerRule Lobatto(int nodesPerFace) => nodesPerFace == 2
        ? new LayerRule("lobatto", 2, [-1, 1], [1, 1])
        : new LayerRule("lobatto", nodesPerFace, [-1, 0, 1], [1.0 / 3, 4.0 / 3, 1.0 / 3]);

    /// <summary>Shape functions of a face at a point, length <see cref="NodesPerFace"/>.</summary>
    public ReadOnlySpan<double> Shapes(int point) => _shapes.AsSpan(point * NodesPerFace, NodesPerFace);

    /// <summary>Derivatives of the shape functions by ξ at a point, length <see cref="NodesPerFace"/>.</summary>
    public ReadOnlySpan<double> Slopes(int point) => _slopes.AsSpan(point * NodesPerFace, NodesPerFace);

    /// <summary>Lagrange shape functions of a face with nodes at -1, (0,) 1.</summary>
    /// <param name="xi">ξ.</param>
    /// <param name="shapes">Length 2 or 3, overwritten.</param>
    /// <param name="slopes">Derivatives by ξ, same length, overwritten.</param>
    internal static void Shape(double xi, Span<double> shapes, Span<double> slopes)
    {
        if (shapes.Length == 2)
        {
            shapes[0] = 0.5 * (1 - xi);
            shapes[1] = 0.5 * (1 + xi);
            slopes[0] = -0.5;
            slopes[1] = 0.5;
            return;
        }
        shapes[0] = 0.5 * xi * (xi - 1);
        shapes[1] = (1 - xi) * (1 + xi);
        shapes[2] = 0.5 * xi * (xi + 1);
        slopes[0] = xi - 0.5;
        slopes[1] = -2 * xi;
        slopes[2] = xi + 0.5;
    }
}
