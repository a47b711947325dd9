namespace InterfaceFE.Geometry;

/// <summary>Division into a given number of even elements, whose lines are moved to places that must have one.</summary>
internal static class EvenDivision
{
    /// <summary>
    /// Elements between neighbouring places; null when two places fall on the same line. Places nearer to the end are counted from there, so that a mirrored
    /// stretch gets the mirrored division.
    /// </summary>
    /// <param name="places">Ascending, from the first to the last end.</param>
    /// <param name="count">Number of elements.</param>
    public static int[]? Counts(ReadOnlySpan<double> places, int count)
    {
        double length = places[^1] - places[0];
        int[] counts = new int[places.Length - 1];
        int before = 0;
        for (int i = 1; i < places.Length; i++)
        {
            double fromStart = (places[i] - places[0]) / length;
            double fromEnd = (places[^1] - places[i]) / length;
            int line = fromStart < fromEnd ? (int)Math.Round(fromStart * count) : count - (int)Math.Round(fromEnd * count);
            if (line <= before)
                return null;
            counts[i - 1] = line - before;
            before = line;
        }
        return counts;
    }

    /// <summary>Largest move of a line from its even place, as a share of the even element length.</summary>
    public static double LargestMove(ReadOnlySpan<double> places, int[] counts)
    {
        int total = counts.Sum();
        double even = (places[^1] - places[0]) / total;
        double largest = 0;
        int line = 0;
        for (int i = 0; i < counts.Length; i++)
        {
            line += counts[i];
            largest = Math.Max(largest, Math.Abs(places[i + 1] - places[0] - line * even) / even);
        }
        return largest;
    }

    /// <summary>Points of a stretch divided evenly.</summary>
    public static double[] Points(double a, double b, int count)
    {
        double[] points = new double[count + 1];
        for (int i = 1; i < count; i++)
            points[i] = a + (b - a) * i / count;
        (points[0], points[count]) = (a, b);
        return points;
    }
}
