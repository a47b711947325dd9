using InterfaceFE.Mechanics.Elements;
using InterfaceFE.Mechanics.Materials;
using MathNet.Numerics.LinearAlgebra;

namespace InterfaceFE.Tests.Mechanics.Elements;

/// <summary>Assembly and solution of one body of one material, for element tests: plain, by a banded Cholesky factor.</summary>
internal sealed class PlaneModel<TElement>
    where TElement : struct, IPlaneElement
{
    private readonly PlaneMesh _mesh;
    private readonly PlaneElasticity _material;
    private readonly double _width;
    private readonly SortedDictionary<int, double> _held = [];

    public PlaneModel(PlaneMesh mesh, PlaneElasticity material, double width = 1)
    {
        (_mesh, _material, _width) = (mesh, material, width);
        Load = new double[2 * mesh.X.Length];
        Displacements = new double[2 * mesh.X.Length];
    }

    public double[] Load { get; }

    public double[] Displacements { get; }

    public double TemperatureChange { get; set; }

    /// <summary>Holds x (direction 0) or y (1) of nodes.</summary>
    public void Hold(IEnumerable<int> nodes, int direction, double value = 0)
    {
        foreach (int node in nodes)
            _held[2 * node + direction] = value;
    }

    /// <summary>Adds a traction on an edge given by its nodes in order; the normal lies to the right of the way along the nodes.</summary>
    public void LoadEdge(int[] nodes, Func<double, double, (double X, double Y)> tractionByNormal)
    {
        double[] points = [-Math.Sqrt(0.6), 0, Math.Sqrt(0.6)], weights = [5.0 / 9, 8.0 / 9, 5.0 / 9];
        int perSide = _mesh.NodesPerElement == 8 ? 3 : 2;
        for (int start = 0; start + perSide <= nodes.Length; start += perSide - 1)
            for (int point = 0; point < 3; point++)
            {
                double s = points[point];
                double[] n = perSide == 3 ? [s * (s - 1) / 2, 1 - s * s, s * (s + 1) / 2] : [(1 - s) / 2, (1 + s) / 2];
                double[] d = perSide == 3 ? [s - 0.5, -2 * s, s + 0.5] : [-0.5, 0.5];
                double dx = 0, dy = 0;
                for (int i = 0; i < perSide; i++)
                    (dx, dy) = (dx + d[i] * _mesh.X[nodes[start + i]], dy + d[i] * _mesh.Y[nodes[start + i]]);
                double length = Math.Sqrt(dx * dx + dy * dy);
                (double tx, double ty) = tractionByNormal(dy / length, -dx / length);
                for (int i = 0; i < perSide; i++)
                {
                    Load[2 * nodes[start + i]] += n[i] * tx * length * weights[point] * _width;
                    Load[2 * nodes[start + i] + 1] += n[i] * ty * length * weights[point] * _width;
                }
            }
    }

    /// <summary>Dense stiffness of all unknowns, nothing held.</summary>
    public Matrix<double> DenseStiffness()
    {
        Matrix<double> matrix = Matrix<double>.Build.Dense(Load.Length, Load.Length);
        double[] local = new double[TElement.Unknowns * TElement.Unknowns];
        for (int e = 0; e < _mesh.ElementCount; e++)
        {
            TElement.Stiffness(_mesh.CoordinatesOf(e), _material, _width, local);
            int[] unknowns = UnknownsOf(e);
            for (int i = 0; i < unknowns.Length; i++)
                for (int j = 0; j < unknowns.Length; j++)
                    matrix[unknowns[i], unknowns[j]] += local[i * unknowns.Length + j];
        }
        return matrix;
    }

    public void Solve()
    {
        int size = Load.Length, band = Enumerable.Range(0, _mesh.ElementCount).Max(e => UnknownsOf(e).Max() - UnknownsOf(e).Min());
        double[][] rows = [.. Enumerable.Range(0, size).Select(_ => new double[band + 1])]; // rows[i][k] = entry (i, i - k)
        double[] right = [.. Load];
        double[] local = new double[TElement.Unknowns * TElement.Unknowns], thermal = new double[TElement.Unknowns];
        for (int e = 0; e < _mesh.ElementCount; e++)
        {
            double[] coordinates = _mesh.CoordinatesOf(e);
            TElement.Stiffness(coordinates, _material, _width, local);
            TElement.ThermalForce(coordinates, _material, _width, thermal);
            int[] unknowns = UnknownsOf(e);
            for (int i = 0; i < unknowns.Length; i++)
            {
                right[unknowns[i]] -= thermal[i] * TemperatureChange;
                for (int j = 0; j < unknowns.Length; j++)
                    if (_held.TryGetValue(unknowns[j], out double value))
                        right[unknowns[i]] -= local[i * unknowns.Length + j] * value;
                    else if (!_held.ContainsKey(unknowns[i]) && unknowns[j] <= unknowns[i])
                        rows[unknowns[i]][unknowns[i] - unknowns[j]] += local[i * unknowns.Length + j];
            }
        }
        foreach ((int unknown, double value) in _held)
            (rows[unknown][0], right[unknown]) = (1, value);
        BandedCholesky.Solve(rows, right);
        right.CopyTo(Displacements, 0);
    }

    public double[] DisplacementsOf(int element) => [.. UnknownsOf(element).Select(i => Displacements[i])];

    public double[] StressesOf(int element)
    {
        double[] stresses = new double[16];
        TElement.Stresses(_mesh.CoordinatesOf(element), _material, DisplacementsOf(element), TemperatureChange, stresses);
        return stresses;
    }

    /// <summary>Internal force of all elements.</summary>
    public double[] InternalForce()
    {
        double[] sum = new double[Load.Length], force = new double[TElement.Unknowns];
        for (int e = 0; e < _mesh.ElementCount; e++)
        {
            TElement.InternalForce(_mesh.CoordinatesOf(e), _material, _width, DisplacementsOf(e), TemperatureChange, force);
            int[] unknowns = UnknownsOf(e);
            for (int i = 0; i < unknowns.Length; i++)
                sum[unknowns[i]] += force[i];
        }
        return sum;
    }

    /// <summary>Stress at a node: xx, yy, zz, xy extrapolated in each element around it, mean of the elements.</summary>
    public double[] StressAtNode(int node)
    {
        double[] mean = new double[4], nodal = new double[4 * TElement.Nodes];
        int count = 0;
        for (int e = 0; e < _mesh.ElementCount; e++)
        {
            int at = _mesh.NodesOf(e).IndexOf(node);
            if (at < 0)
                continue;
            TElement.ExtrapolateToNodes(4, StressesOf(e), nodal);
            for (int i = 0; i < 4; i++)
                mean[i] += nodal[4 * at + i];
            count++;
        }
        return [.. mean.Select(v => v / count)];
    }

    private int[] UnknownsOf(int element)
    {
        int[] unknowns = new int[TElement.Unknowns];
        ReadOnlySpan<int> nodes = _mesh.NodesOf(element);
        for (int i = 0; i < nodes.Length; i++)
            (unknowns[2 * i], unknowns[2 * i + 1]) = (2 * nodes[i], 2 * nodes[i] + 1);
        return unknowns;
    }
}
