namespace InterfaceFE.Geometry;

/// <summary>
/// Division of a stretch by a wanted length that falls towards its ends. The wanted length at distance s from an end is at most (end length) + ln(growth)·s, so that
/// neighbouring elements differ by at most the growth ratio; the number is the least whole one for which no element is longer than wanted, and all share the slack.
/// </summary>
internal static class GradedDivision
{
    /// <summary>Number of elements that would be needed, as a real number; use before <see cref="Points"/> to see whether it is within reach.</summary>
    public static double Measure(double length, double wanted, double atStart, double atEnd, double growth)
    {
        Span<Piece> pieces = stackalloc Piece[3];
        return Pieces(length, wanted, atStart, atEnd, Math.Log(growth), pieces, out _);
    }

    /// <summary>Division points from a to b, both included and exact.</summary>
    /// <param name="a">Start.</param>
    /// <param name="b">End, greater than a.</param>
    /// <param name="wanted">Largest length of an element.</param>
    /// <param name="atStart">Largest length at the start.</param>
    /// <param name="atEnd">Largest length at the end.</param>
    /// <param name="growth">Largest ratio of neighbours, above 1.</param>
    public static double[] Points(double a, double b, double wanted, double atStart, double atEnd, double growth)
    {
        Span<Piece> pieces = stackalloc Piece[3];
        double measure = Pieces(b - a, wanted, atStart, atEnd, Math.Log(growth), pieces, out int pieceCount);
        // A hair of slack, so that a stretch of ten wanted lengths gets ten elements whatever the round-off.
        int count = Math.Max(1, (int)Math.Ceiling(measure * (1 - 1e-9)));
        double[] points = new double[count + 1];
        (points[0], points[count]) = (a, b);
        int at = 0;
        double before = 0;
        for (int i = 1; i < count; i++)
        {
            double target = measure * i / count;
            while (at < pieceCount - 1 && target > before + pieces[at].Measure)
                before += pieces[at++].Measure;
            points[i] = a + pieces[at].Position(target - before);
        }
        return points;
    }

    private static double Pieces(double length, double wanted, double atStart, double atEnd, double slope, Span<Piece> pieces, out int count)
    {
        atStart = Math.Min(atStart, wanted);
        atEnd = Math.Min(atEnd, wanted);
        double rise = (wanted - atStart) / slope;
        double fall = (wanted - atEnd) / slope;
        if (rise + fall >= length)
        {
            // The cones meet below the wanted length, or one of them covers all.
            rise = Math.Clamp((length + (atEnd - atStart) / slope) / 2, 0, length);
            fall = length - rise;
        }
        count = 0;
        double measure = 0;
        if (rise > 0)
            pieces[count++] = new Piece(0, rise, rise < length ? atStart : Math.Min(atStart, atEnd + slope * length), slope);
        if (length - rise - fall > 0)
            pieces[count++] = new Piece(rise, length - rise - fall, wanted, 0);
        if (fall > 0)
            pieces[count++] = new Piece(length - fall, fall, atEnd + slope * fall, -slope);
        for (int i = 0; i < count; i++)
            measure += pieces[i].Measure;
        return measure;
    }

    /// <summary>A piece with a linear wanted length.</summary>
    private readonly record struct Piece(double Start, double Length, double Wanted, double Slope)
    {
        public double Measure => Slope == 0 ? Length / Wanted : Math.Log(1 + Slope * Length / Wanted) / Slope;

        public double Position(double measure) => Start + (Slope == 0 ? measure * Wanted : Wanted * (Math.Exp(Slope * measure) - 1) / Slope);
    }
}
