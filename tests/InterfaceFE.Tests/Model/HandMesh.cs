using InterfaceFE.Geometry;

namespace InterfaceFE.Tests.Model;

/// <summary>
/// Two adherends with a layer between them, drawn by hand: nodes inside and along the joint stand irregularly, and the whole may be turned, so that the joint is inclined. Sides stay
/// straight with their middle nodes in the middle.
/// </summary>
internal sealed class HandMesh
{
    public const int Along = 3, Through = 2;

    private HandMesh(Mesh mesh, int[] outer) => (Mesh, Outer) = (mesh, outer);

    public Mesh Mesh { get; }

    /// <summary>Nodes of the outline, ends of the joint among them.</summary>
    public int[] Outer { get; }

    public static HandMesh Make(bool quadratic, double angle)
    {
        List<double> x = [], y = [];
        List<int> outer = [];
        (double s, double c) = Math.SinCos(angle);
        MeshedAdherend lower = Block("lower", 0, 1.5), upper = Block("upper", 1.5, 1.2);
        int perFace = quadratic ? 3 : 2, step = perFace - 1, columns = step * Along + 1;
        int[] below = lower.Edges["top"].Nodes, above = upper.Edges["bottom"].Nodes;
        List<int> lowerNodes = [], upperNodes = [];
        double[] position = new double[Along + 1];
        for (int e = 0; e < Along; e++)
        {
            for (int k = 0; k < perFace; k++)
            {
                lowerNodes.Add(below[e * step + k]);
                upperNodes.Add(above[e * step + k]);
            }
            position[e + 1] = lower.Edges["top"].Arc[(e + 1) * step];
        }
        MeshedJoint joint = new()
        {
            Name = "bond",
            Layer = "glue",
            Width = 1.7,
            LowerAdherend = 0,
            UpperAdherend = 1,
            LowerNodes = [.. lowerNodes],
            UpperNodes = [.. upperNodes],
            Bonded = [true, true, true],
            Position = position,
            OnePercentLength = 1,
            ProcessZoneEstimate = 1,
        };
        return new HandMesh(new Mesh { X = [.. x], Y = [.. y], NodesPerSolid = quadratic ? 8 : 4, Adherends = [lower, upper], Joints = [joint] }, [.. outer]);

        // Corners of a grid, the inner ones moved; along the joint line the corners slide along the line, alike in both adherends.
        MeshedAdherend Block(string name, double bottom, double height)
        {
            int half = quadratic ? 2 : 1, first = x.Count, rows = half * Through, cols = half * Along;
            double[][] cornerX = [.. Enumerable.Range(0, Along + 1).Select(i => Enumerable.Range(0, Through + 1).Select(j => Corner(i, j).X).ToArray())];
            double[][] cornerY = [.. Enumerable.Range(0, Along + 1).Select(i => Enumerable.Range(0, Through + 1).Select(j => Corner(i, j).Y).ToArray())];
            int[][] node = [.. Enumerable.Range(0, cols + 1).Select(_ => new int[rows + 1])];
            for (int i = 0; i <= cols; i++)
            {
                for (int j = 0; j <= rows; j++)
                {
                    if (quadratic && i % 2 == 1 && j % 2 == 1)
                        continue;
                    int i0 = i / half, i1 = (i + half - 1) / half, j0 = j / half, j1 = (j + half - 1) / half;
                    double px = 0.5 * (cornerX[i0][j0] + cornerX[i1][j1]), py = 0.5 * (cornerY[i0][j0] + cornerY[i1][j1]);
                    node[i][j] = x.Count;
                    bool onJoint = bottom == 0 ? j == rows : j == 0;
                    if (i == 0 || i == cols || (!onJoint && (j == 0 || j == rows)))
                        outer.Add(x.Count);
                    x.Add(c * px - s * py);
                    y.Add(s * px + c * py);
                }
            }
            List<int> connectivity = [];
            for (int e = 0; e < Along; e++)
            {
                for (int t = 0; t < Through; t++)
                {
                    int a = half * e, b = a + half, d = half * t, u = d + half;
                    connectivity.AddRange([node[a][d], node[b][d], node[b][u], node[a][u]]);
                    if (quadratic)
                        connectivity.AddRange([node[a + 1][d], node[b][d + 1], node[a + 1][u], node[a][d + 1]]);
                }
            }
            return new MeshedAdherend
            {
                Name = name,
                Material = "stuff",
                Width = 1.7,
                Thickness = height,
                Connectivity = [.. connectivity],
                FirstNode = first,
                NodeCount = x.Count - first,
                ElementsAlong = Along,
                ElementsThrough = Through,
                Edges = new Dictionary<string, MeshedEdge> { ["top"] = Edge(node, rows), ["bottom"] = Edge(node, 0) },
                StraightAlongX = false,
            };

            (double X, double Y) Corner(int i, int j)
            {
                bool onJoint = bottom == 0 ? j == Through : j == 0, inside = i is > 0 and < Along;
                double px = 1.1 * i + (inside ? (onJoint ? 0.17 * (2 * i - 3) : 0.13 * Math.Sin(5 * i + 3 * j + height)) : 0);
                return (px, bottom + height * j / Through + (inside && j is > 0 and < Through ? 0.16 * Math.Cos(2 * i + height) : 0));
            }
        }

        MeshedEdge Edge(int[][] node, int row)
        {
            int[] nodes = [.. node.Select(column => column[row])];
            return new MeshedEdge { Nodes = nodes, Arc = [.. nodes.Select(n => double.Hypot(x[n] - x[nodes[0]], y[n] - y[nodes[0]]))] };
        }
    }
}
