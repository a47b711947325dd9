using InterfaceFE.Decks;

namespace InterfaceFE.Geometry;

/// <summary>Refuses elements on which no calculation can rest: turned inside out, without size, far too slender, or with corners far from square.</summary>
internal static class ElementCheck
{
    /// <summary>Largest ratio of the longest to the shortest side.</summary>
    public const double LargestAspect = 1000;

    private const double SharpestAngle = 10 * Math.PI / 180;

    /// <summary>Checks all elements of an adherend.</summary>
    /// <exception cref="DeckException">For the worst kind of fault met first, with the place.</exception>
    public static void Check(Strip strip, int[] connectivity, int perElement, double[] x, double[] y)
    {
        for (int start = 0; start < connectivity.Length; start += perElement)
            CheckOne(strip, connectivity.AsSpan(start, perElement), x, y);
    }

    private static void CheckOne(Strip strip, ReadOnlySpan<int> nodes, double[] x, double[] y)
    {
        double shortest = double.PositiveInfinity;
        double longest = 0;
        double sharpest = 1;
        double leastArea = double.PositiveInfinity;
        for (int i = 0; i < 4; i++)
        {
            (int a, int b, int c) = (nodes[(i + 3) % 4], nodes[i], nodes[(i + 1) % 4]);
            double ux = x[c] - x[b];
            double uy = y[c] - y[b];
            double vx = x[a] - x[b];
            double vy = y[a] - y[b];
            double u = Math.Sqrt(ux * ux + uy * uy);
            shortest = Math.Min(shortest, u);
            longest = Math.Max(longest, u);
            double cross = ux * vy - uy * vx;
            leastArea = Math.Min(leastArea, cross);
            sharpest = Math.Min(sharpest, cross / (u * Math.Sqrt(vx * vx + vy * vy)));
        }
        string? fault = null;
        if (!(shortest > 0))
            fault = "has a side without length";
        else if (!(leastArea > 0) || (nodes.Length == 8 && !(LeastJacobian(nodes, x, y) > 0)))
            fault = "is turned inside out";
        else if (longest > LargestAspect * shortest)
            fault = Text.Of($"is {longest / shortest:F0} times as long as wide ({longest:G4} mm by {shortest:G4} mm; up to {LargestAspect:F0} is possible): change the numbers or lengths of elements");
        else if (sharpest < Math.Sin(SharpestAngle))
            fault = Text.Of($"has a corner of {Math.Asin(sharpest) * 180 / Math.PI:F1}°");
        if (fault != null)
            throw new DeckException(strip.Path, Text.Of($"the element of \"{strip.Name}\" at [{(x[nodes[0]] + x[nodes[2]]) / 2:G6} mm, {(y[nodes[0]] + y[nodes[2]]) / 2:G6} mm] ") + fault);
    }

    /// <summary>Least determinant of the eight-node map at the corners and the middles of sides.</summary>
    private static double LeastJacobian(ReadOnlySpan<int> nodes, double[] x, double[] y)
    {
        double least = double.PositiveInfinity;
        for (int i = -1; i <= 1; i++)
            for (int j = -1; j <= 1; j++)
                least = Math.Min(least, EightNodeMap.Jacobian(nodes, x, y, i, j));
        return least;
    }
}
