namespace InterfaceFE.Mechanics.Elements;

/// <summary>The 2×2 Gauss rule on [-1, 1]², all weights 1. Point i lies nearest to corner i (counter-clockwise from (-1, -1)).</summary>
public static class GaussPoints
{
    /// <summary>Number of points.</summary>
    public const int Count = 4;

    /// <summary>Distance of the points from the axes, 1/√3.</summary>
    public const double Offset = 0.57735026918962576451;

    private static readonly double[] CornerXi = [-1, 1, 1, -1];
    private static readonly double[] CornerEta = [-1, -1, 1, 1];

    /// <summary>First natural coordinate of a point.</summary>
    public static double Xi(int point) => CornerXi[point] * Offset;

    /// <summary>Second natural coordinate of a point.</summary>
    public static double Eta(int point) => CornerEta[point] * Offset;

    /// <summary>Value at (xi, eta) of the bilinear function that takes given values at the points: weight of each point, length 4.</summary>
    public static void InterpolationWeights(double xi, double eta, Span<double> weights)
    {
        for (int i = 0; i < Count; i++)
            weights[i] = 0.25 * (1 + CornerXi[i] * xi / Offset) * (1 + CornerEta[i] * eta / Offset);
    }
}
