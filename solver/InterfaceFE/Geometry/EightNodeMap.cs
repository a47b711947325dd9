namespace InterfaceFE.Geometry;

/// <summary>The map of an eight-node element from its square, -1 to 1, to the plane.</summary>
internal static class EightNodeMap
{
    private static readonly double[] CornerXi = [-1, 1, 1, -1];
    private static readonly double[] CornerEta = [-1, -1, 1, 1];

    /// <summary>Determinant of the map's derivative at a place of the square [mm²].</summary>
    public static double Jacobian(ReadOnlySpan<int> nodes, double[] x, double[] y, double xi, double eta)
    {
        double xXi = 0, xEta = 0, yXi = 0, yEta = 0;
        for (int i = 0; i < 8; i++)
        {
            (double dXi, double dEta) = Slope(i, xi, eta);
            xXi += dXi * x[nodes[i]];
            xEta += dEta * x[nodes[i]];
            yXi += dXi * y[nodes[i]];
            yEta += dEta * y[nodes[i]];
        }
        return xXi * yEta - xEta * yXi;
    }

    private static (double Xi, double Eta) Slope(int node, double xi, double eta)
    {
        if (node < 4)
        {
            // N = (1 + aξ)(1 + bη)(aξ + bη - 1)/4.
            double a = CornerXi[node];
            double b = CornerEta[node];
            return (a * (1 + b * eta) * (2 * a * xi + b * eta) / 4, b * (1 + a * xi) * (a * xi + 2 * b * eta) / 4);
        }
        double side = node is 4 or 7 ? -1 : 1;
        // N = (1 - ξ²)(1 + sη)/2 on the lower and upper side, (1 + sξ)(1 - η²)/2 on the right and left side.
        return node % 2 == 0 ? (-xi * (1 + side * eta), side * (1 - xi * xi) / 2) : (side * (1 - eta * eta) / 2, -eta * (1 + side * xi));
    }
}
