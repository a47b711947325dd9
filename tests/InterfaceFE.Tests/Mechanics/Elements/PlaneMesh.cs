namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>A mesh of one body for element tests. Nodes of an element: corners counter-clockwise, then middle nodes from side 0-1.</summary>
internal sealed class PlaneMesh
{
    public required double[] X { get; init; }

    public required double[] Y { get; init; }

    public required int NodesPerElement { get; init; }

    public required int[] Connectivity { get; init; }

    /// <summary>Nodes in order along i at j = 0; empty for a mesh that is no grid.</summary>
    public int[] Bottom { get; init; } = [];

    public int[] Top { get; init; } = [];

    /// <summary>Nodes in order along j at i = 0.</summary>
    public int[] Left { get; init; } = [];

    public int[] Right { get; init; } = [];

    public int ElementCount => Connectivity.Length / NodesPerElement;

    public ReadOnlySpan<int> NodesOf(int element) => Connectivity.AsSpan(element * NodesPerElement, NodesPerElement);

    public double[] CoordinatesOf(int element)
    {
        double[] coordinates = new double[2 * NodesPerElement];
        ReadOnlySpan<int> nodes = NodesOf(element);
        for (int i = 0; i < nodes.Length; i++)
            (coordinates[2 * i], coordinates[2 * i + 1]) = (X[nodes[i]], Y[nodes[i]]);
        return coordinates;
    }

    /// <summary>
    /// Grid of along × through elements. The map takes positions counted in elements; middle nodes lie on the map, or half way between corners with straight
    /// sides.
    /// </summary>
    public static PlaneMesh Grid(int nodesPerElement, int along, int through, Func<double, double, (double X, double Y)> map, bool straightSides = false)
    {
        int step = nodesPerElement == 8 ? 2 : 1;
        Dictionary<(int I, int J), int> numbers = [];
        List<double> x = [], y = [];
        for (int i = 0; i <= step * along; i++)
            for (int j = 0; j <= step * through; j++)
            {
                bool middleI = i % step != 0, middleJ = j % step != 0;
                if (middleI && middleJ)
                    continue;
                numbers[(i, j)] = x.Count;
                (double px, double py) = map((double)i / step, (double)j / step);
                if (straightSides && (middleI || middleJ))
                {
                    (double ax, double ay) = map(i / step, j / step);
                    (double bx, double by) = map(middleI ? i / step + 1 : i / step, middleJ ? j / step + 1 : j / step);
                    (px, py) = ((ax + bx) / 2, (ay + by) / 2);
                }
                x.Add(px);
                y.Add(py);
            }
        List<int> connectivity = [];
        for (int i = 0; i < along; i++)
            for (int j = 0; j < through; j++)
                foreach ((int di, int dj) in Offsets(nodesPerElement))
                    connectivity.Add(numbers[(step * i + di, step * j + dj)]);
        return new PlaneMesh
        {
            X = [.. x],
            Y = [.. y],
            NodesPerElement = nodesPerElement,
            Connectivity = [.. connectivity],
            Bottom = [.. Enumerable.Range(0, step * along + 1).Select(i => numbers[(i, 0)])],
            Top = [.. Enumerable.Range(0, step * along + 1).Select(i => numbers[(i, step * through)])],
            Left = [.. Enumerable.Range(0, step * through + 1).Select(j => numbers[(0, j)])],
            Right = [.. Enumerable.Range(0, step * through + 1).Select(j => numbers[(step * along, j)])],
        };
    }

    /// <summary>Mesh from corner nodes; with eight nodes the middle nodes are added half way along each side.</summary>
    public static PlaneMesh FromCorners(int nodesPerElement, (double X, double Y)[] corners, int[][] elements)
    {
        List<double> x = [.. corners.Select(c => c.X)], y = [.. corners.Select(c => c.Y)];
        Dictionary<(int, int), int> middles = [];
        List<int> connectivity = [];
        foreach (int[] element in elements)
        {
            connectivity.AddRange(element);
            for (int side = 0; nodesPerElement == 8 && side < 4; side++)
            {
                int a = element[side], b = element[(side + 1) % 4];
                if (!middles.TryGetValue((Math.Min(a, b), Math.Max(a, b)), out int middle))
                {
                    middle = middles[(Math.Min(a, b), Math.Max(a, b))] = x.Count;
                    x.Add((x[a] + x[b]) / 2);
                    y.Add((y[a] + y[b]) / 2);
                }
                connectivity.Add(middle);
            }
        }
        return new PlaneMesh { X = [.. x], Y = [.. y], NodesPerElement = nodesPerElement, Connectivity = [.. connectivity] };
    }

    private static (int, int)[] Offsets(int nodesPerElement) => nodesPerElement == 8
        ? [(0, 0), (2, 0), (2, 2), (0, 2), (1, 0), (2, 1), (1, 2), (0, 1)]
        : [(0, 0), (1, 0), (1, 1), (0, 1)];
}
