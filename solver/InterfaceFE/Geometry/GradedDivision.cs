namespace InterfaceFE.Geometry;

/// <summary>
/// Division of a stretch by a length field: given lengths at both ends, a level between them, and ramps of slope ln(growth). Each element holds a unit of the integral
/// of 1/field, so neighbours differ by at most the growth ratio, also across the ends where another stretch goes on with the same length. The level is lowered until
/// the integral is a whole number; it may dip below the lengths at the ends.
/// </summary>
/// <param name="Length">Length of the stretch.</param>
/// <param name="Wanted">Highest level.</param>
/// <param name="AtStart">Field at the start, at most the highest level.</param>
/// <param name="AtEnd">Field at the end, at most the highest level.</param>
/// <param name="Slope">Natural logarithm of the growth ratio.</param>
internal readonly record struct GradedDivision(double Length, double Wanted, double AtStart, double AtEnd, double Slope)
{
    private const int Halvings = 100;

    /// <summary>Least number of elements none of which is longer than wanted, as a whole number held in a real one.</summary>
    public double LeastCount => Math.Max(1, Math.Ceiling(Measure(Wanted) * (1 - 1e-9)));

    /// <summary>Field in the dip where the ramps from both ends meet; not positive when they never meet above zero.</summary>
    private double Dip => (AtStart + AtEnd - Slope * Length) / 2;

    /// <summary>Whether a level exists at which the stretch holds exactly a number of elements, at least <see cref="LeastCount"/>.</summary>
    public bool CanHold(double count) => Dip <= 0 || (Math.Log(AtStart / Dip) + Math.Log(AtEnd / Dip)) / Slope >= count * (1 - 1e-12);

    /// <summary>
    /// Largest lengths at the ends, not above those given, with which the stretch holds a number of elements. The longer end gives way first: at the shorter one
    /// an even division may go on, a bond for example.
    /// </summary>
    public (double AtStart, double AtEnd) EndsToHold(double count)
    {
        double least = Math.Min(AtStart, AtEnd);
        GradedDivision even = Capped(least);
        return even.CanHold(count) ? Highest(least, Math.Max(AtStart, AtEnd), count) : Highest(0, least, count);
    }

    private GradedDivision Capped(double cap) => this with { AtStart = Math.Min(AtStart, cap), AtEnd = Math.Min(AtEnd, cap) };

    /// <summary>Ends under the highest cap that lets the stretch hold a number of elements; the low cap does, the high one does not.</summary>
    private (double AtStart, double AtEnd) Highest(double low, double high, double count)
    {
        for (int i = 0; i < Halvings && high - low > 1e-14 * high; i++)
        {
            double middle = (low + high) / 2;
            if (Capped(middle).CanHold(count))
                low = middle;
            else
                high = middle;
        }
        GradedDivision found = Capped(low);
        return (found.AtStart, found.AtEnd);
    }

    /// <summary>Division points from a, both ends included; the end is b exactly.</summary>
    public double[] Points(double a, double b)
    {
        int count = (int)LeastCount;
        Span<Ramp> ramps = stackalloc Ramp[3];
        int rampCount = Ramps(LevelFor(count), ramps);
        double measure = 0;
        for (int i = 0; i < rampCount; i++)
            measure += ramps[i].Measure;
        double[] points = new double[count + 1];
        (points[0], points[count]) = (a, b);
        int at = 0;
        double before = 0;
        for (int i = 1; i < count; i++)
        {
            double target = measure * i / count;
            while (at < rampCount - 1 && target > before + ramps[at].Measure)
                before += ramps[at++].Measure;
            points[i] = a + ramps[at].Position(target - before);
        }
        return points;
    }

    /// <summary>The level at which the measure is a number of elements.</summary>
    private double LevelFor(int count)
    {
        double low = Math.Max(Dip, Math.Min(Math.Min(AtStart, AtEnd), Length / count) * 1e-3);
        double high = Wanted;
        for (int i = 0; i < Halvings && high - low > 1e-15 * high; i++)
        {
            double middle = (low + high) / 2;
            if (Measure(middle) > count)
                low = middle;
            else
                high = middle;
        }
        return high;
    }

    /// <summary>Integral of 1/field with a level.</summary>
    private double Measure(double level)
    {
        Span<Ramp> ramps = stackalloc Ramp[3];
        int count = Ramps(level, ramps);
        double measure = 0;
        for (int i = 0; i < count; i++)
            measure += ramps[i].Measure;
        return measure;
    }

    private int Ramps(double level, Span<Ramp> ramps)
    {
        double first = Math.Abs(level - AtStart) / Slope;
        double last = Math.Abs(level - AtEnd) / Slope;
        int sign = level >= Math.Max(AtStart, AtEnd) ? 1 : level <= Math.Min(AtStart, AtEnd) ? -1 : 0;
        if (first + last >= Length)
        {
            // Ramps that rise (or fall) from both ends meet before the level; else one ramp leads from end to end.
            first = sign != 0 ? Math.Clamp((Length + sign * (AtEnd - AtStart) / Slope) / 2, 0, Length) : Length * first / (first + last);
            last = Length - first;
        }
        int count = 0;
        if (first > 0)
            ramps[count++] = new Ramp(0, first, AtStart, Slope * Math.Sign(level - AtStart));
        if (Length - first - last > 0)
            ramps[count++] = new Ramp(first, Length - first - last, level, 0);
        if (last > 0)
            ramps[count++] = new Ramp(Length - last, last, AtEnd + Slope * Math.Sign(level - AtEnd) * last, -Slope * Math.Sign(level - AtEnd));
        return count;
    }

    /// <summary>A piece with a linear field.</summary>
    private readonly record struct Ramp(double Start, double Length, double Field, double Slope)
    {
        public double Measure => Slope == 0 ? Length / Field : Math.Log(1 + Slope * Length / Field) / Slope;

        public double Position(double measure) => Start + (Slope == 0 ? measure * Field : Field * (Math.Exp(Slope * measure) - 1) / Slope);
    }
}
