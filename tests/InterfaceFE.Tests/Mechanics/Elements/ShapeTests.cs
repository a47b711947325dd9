using InterfaceFE.Mechanics.Elements;
using Xunit;

namespace InterfaceFE.Tests.Mechanics.Elements;

public sealed class ShapeTestsOfEightNodes : ShapeTests<Quadrilateral8>;

public sealed class ShapeTestsOfFourNodes : ShapeTests<Quadrilateral4>;

/// <summary>Shape functions, map, quality and extrapolation, against their definitions.</summary>
public abstract class ShapeTests<TElement>
    where TElement : struct, IPlaneElement
{
    private static readonly double[] NodeXi = [-1, 1, 1, -1, 0, 1, 0, -1];
    private static readonly double[] NodeEta = [-1, -1, 1, 1, -1, 0, 1, 0];

    [Fact]
    public void Shape_functions_are_one_at_their_own_node_and_zero_at_the_others()
    {
        double[] values = new double[TElement.Nodes];
        for (int node = 0; node < TElement.Nodes; node++)
        {
            TElement.ShapeFunctions(NodeXi[node], NodeEta[node], values);
            for (int i = 0; i < TElement.Nodes; i++)
                Close.To(i == node ? 1 : 0, values[i], 0, 1e-15, $"function {i} at node {node}");
        }
    }

    [Fact]
    public void Shape_functions_sum_to_one_and_their_derivatives_match_differences()
    {
        int n = TElement.Nodes;
        double[] values = new double[n], up = new double[n], down = new double[n], byXi = new double[n], byEta = new double[n];
        const double xi = 0.31, eta = -0.57, step = 1e-5;
        TElement.ShapeFunctions(xi, eta, values);
        TElement.ShapeDerivatives(xi, eta, byXi, byEta);
        Close.To(1, values.Sum(), 1e-14);
        Close.To(0, byXi.Sum(), 0, 1e-14);
        Close.To(0, byEta.Sum(), 0, 1e-14);
        // At most quadratic in each coordinate: central differences have round-off alone.
        TElement.ShapeFunctions(xi + step, eta, up);
        TElement.ShapeFunctions(xi - step, eta, down);
        for (int i = 0; i < n; i++)
            Close.To((up[i] - down[i]) / (2 * step), byXi[i], 0, 1e-10);
        TElement.ShapeFunctions(xi, eta + step, up);
        TElement.ShapeFunctions(xi, eta - step, down);
        for (int i = 0; i < n; i++)
            Close.To((up[i] - down[i]) / (2 * step), byEta[i], 0, 1e-10);
    }

    [Fact]
    public void Gradients_at_Gauss_points_are_exact_for_a_linear_field_and_areas_sum_to_the_polygon()
    {
        double[] coordinates = Samples.Distorted<TElement>(5, curved: false);
        double[] byX = new double[4 * TElement.Nodes], byY = new double[4 * TElement.Nodes], areas = new double[4];
        TElement.ShapeGradients(coordinates, byX, byY, areas);
        for (int point = 0; point < 4; point++)
        {
            double x = 0, y = 0;
            for (int node = 0; node < TElement.Nodes; node++)
            {
                double value = 3 + 2 * coordinates[2 * node] - 5 * coordinates[2 * node + 1];
                x += byX[point * TElement.Nodes + node] * value;
                y += byY[point * TElement.Nodes + node] * value;
            }
            Close.To(2, x, 1e-12);
            Close.To(-5, y, 1e-12);
        }
        double polygon = 0;
        for (int i = 0; i < 4; i++)
        {
            int j = (i + 1) % 4;
            polygon += 0.5 * (coordinates[2 * i] * coordinates[2 * j + 1] - coordinates[2 * j] * coordinates[2 * i + 1]);
        }
        Close.To(polygon, areas.Sum(), 1e-13);
        Close.To(polygon, TElement.Shape(coordinates).Area, 1e-13);
    }

    [Fact]
    public void Gauss_positions_follow_the_map_and_lie_nearest_to_their_corner()
    {
        double[] coordinates = Samples.Distorted<TElement>(3, curved: true), positions = new double[8], values = new double[TElement.Nodes];
        TElement.GaussPositions(coordinates, positions);
        for (int point = 0; point < 4; point++)
        {
            TElement.ShapeFunctions(NodeXi[point] / Math.Sqrt(3), NodeEta[point] / Math.Sqrt(3), values);
            double x = 0, y = 0;
            for (int node = 0; node < TElement.Nodes; node++)
                (x, y) = (x + values[node] * coordinates[2 * node], y + values[node] * coordinates[2 * node + 1]);
            Close.To(x, positions[2 * point], 1e-13);
            Close.To(y, positions[2 * point + 1], 1e-13);
        }
    }

    [Fact]
    public void Parallelograms_have_the_ratio_one()
    {
        ElementShape shape = TElement.Shape(Samples.FromCorners<TElement>([1, 1, 5, 2, 6, 4, 2, 3]));
        Close.To(1, shape.SmallestRatio, 1e-13);
        Close.To(7, shape.Area, 1e-13);
        Assert.True(shape.IsValid);
    }

    [Fact]
    public void Clockwise_nodes_are_found()
    {
        ElementShape shape = TElement.Shape(Samples.FromCorners<TElement>([0, 0, 0, 1, 1, 1, 1, 0]));
        Close.To(-1, shape.Area, 1e-13);
        Close.To(-1, shape.SmallestRatio, 1e-13);
        Assert.False(shape.IsValid);
    }

    [Fact]
    public void Folded_and_flat_and_unfinished_elements_are_found()
    {
        // A corner pulled through the opposite diagonal, all nodes on a line, a coordinate that is no number.
        Assert.True(TElement.Shape(Samples.FromCorners<TElement>([0, 0, 1, 0, 0.2, 0.2, 0, 1])).SmallestRatio < 0);
        Assert.False(TElement.Shape(Samples.FromCorners<TElement>([0, 0, 1, 0, 0.2, 0.2, 0, 1])).IsValid);
        Assert.False(TElement.Shape(Samples.FromCorners<TElement>([0, 0, 1, 0, 2, 0, 3, 0])).IsValid);
        Assert.False(TElement.Shape(Samples.FromCorners<TElement>([0, 0, 1, 0, double.NaN, 1, 0, 1])).IsValid);
    }

    [Fact]
    public void A_trapezoid_has_the_ratio_of_its_shorter_side()
    {
        // Parallel sides 2 and 1, height 1: the determinant is proportional to the width at its height, mean width 1.5.
        ElementShape shape = TElement.Shape(Samples.FromCorners<TElement>([0, 0, 2, 0, 1.5, 1, 0.5, 1]));
        Close.To(1 / 1.5, shape.SmallestRatio, 1e-13);
    }

    [Fact]
    public void Extrapolation_is_exact_for_bilinear_fields()
    {
        double[] gauss = new double[8], nodal = new double[2 * TElement.Nodes];
        for (int point = 0; point < 4; point++)
            (gauss[2 * point], gauss[2 * point + 1]) = Field(NodeXi[point] / Math.Sqrt(3), NodeEta[point] / Math.Sqrt(3));
        TElement.ExtrapolateToNodes(2, gauss, nodal);
        for (int node = 0; node < TElement.Nodes; node++)
        {
            (double first, double second) = Field(NodeXi[node], NodeEta[node]);
            Close.To(first, nodal[2 * node], 1e-13, 1e-13);
            Close.To(second, nodal[2 * node + 1], 1e-13, 1e-13);
        }

        static (double, double) Field(double xi, double eta) => (2 + 3 * xi - eta + 0.5 * xi * eta, -1 + xi + 4 * eta);
    }
}
