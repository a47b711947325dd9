namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Points joined by straight lines, from (0, 0) to traction 0. The first segment is the elastic part. Traction over separation never rises from point to
/// point, so that damage never falls. Area by trapezoids, exact.
/// </summary>
public sealed class TableCurve : ITractionCurve
{
    private readonly double[] _separations;
    private readonly double[] _tractions;
    private readonly double[] _areas;

    /// <summary>Curve from points.</summary>
    /// <param name="separations">Separations [mm], at least three, strictly rising from 0.</param>
    /// <param name="tractions">Tractions [MPa], as many; 0 first and last, above 0 between.</param>
    /// <exception cref="ArgumentException">The points break one of these rules, or traction over separation rises; the message names the point, from 0.</exception>
    public TableCurve(ReadOnlySpan<double> separations, ReadOnlySpan<double> tractions)
    {
        Check(separations, tractions);
        _separations = separations.ToArray();
        _tractions = tractions.ToArray();
        _areas = new double[_separations.Length];
        int peak = 1;
        for (int i = 1; i < _areas.Length; i++)
        {
            _areas[i] = _areas[i - 1] + 0.5 * (_tractions[i] + _tractions[i - 1]) * (_separations[i] - _separations[i - 1]);
            if (_tractions[i] > _tractions[peak])
                peak = i;
        }
        Stiffness = Admissible.Positive(_tractions[1] / _separations[1], "stiffness of the first segment");
        Toughness = Admissible.Positive(_areas[^1], "area of the table");
        Strength = _tractions[peak];
        PeakSeparation = _separations[peak];
    }

    /// <inheritdoc/>
    public double ElasticLimit => _separations[1];

    /// <inheritdoc/>
    public double FinalSeparation => _separations[^1];

    /// <inheritdoc/>
    public double Stiffness { get; }

    /// <inheritdoc/>
    public double Strength { get; }

    /// <inheritdoc/>
    public double Toughness { get; }

    /// <inheritdoc/>
    public double PeakSeparation { get; }

    /// <inheritdoc/>
    public double Traction(double separation)
    {
        if (separation >= FinalSeparation)
            return 0;
        if (separation <= ElasticLimit)
            return Stiffness * separation;
        int i = SegmentOf(separation);
        return _tractions[i] + SegmentSlope(i) * (separation - _separations[i]);
    }

    /// <inheritdoc/>
    public double Slope(double separation)
    {
        if (separation >= FinalSeparation)
            return 0;
        return separation < ElasticLimit ? Stiffness : SegmentSlope(SegmentOf(separation));
    }

    /// <inheritdoc/>
    public double Area(double separation)
    {
        if (separation >= FinalSeparation)
            return Toughness;
        if (separation <= ElasticLimit)
            return 0.5 * Stiffness * separation * separation;
        int i = SegmentOf(separation);
        double into = separation - _separations[i];
        return _areas[i] + into * (_tractions[i] + 0.5 * SegmentSlope(i) * into);
    }

    private double SegmentSlope(int i) => (_tractions[i + 1] - _tractions[i]) / (_separations[i + 1] - _separations[i]);

    /// <summary>Segment that holds a separation between elastic limit and end; at a point the segment to its right.</summary>
    private int SegmentOf(double separation)
    {
        int low = 1, high = _separations.Length - 1;
        while (high - low > 1)
        {
            int middle = (low + high) / 2;
            if (separation >= _separations[middle])
                low = middle;
            else
                high = middle;
        }
        return low;
    }

    private static void Check(ReadOnlySpan<double> w, ReadOnlySpan<double> t)
    {
        if (w.Length != t.Length || w.Length < 3)
            throw new ArgumentException(Admissible.Text($"a table needs as many tractions as separations and at least 3 points; it has {w.Length} separations and {t.Length} tractions"), nameof(w));
        for (int i = 0; i < w.Length; i++)
            if (!double.IsFinite(w[i]) || !double.IsFinite(t[i]))
                throw new ArgumentException(Admissible.Text($"point {i} of the table is ({w[i]:R} mm, {t[i]:R} MPa): both must be finite"), nameof(w));
        if (w[0] != 0 || t[0] != 0)
            throw new ArgumentException(Admissible.Text($"the table must start at (0 mm, 0 MPa), not at ({w[0]:R} mm, {t[0]:R} MPa)"), nameof(w));
        if (t[^1] != 0)
            throw new ArgumentException(Admissible.Text($"the table must end at traction 0 MPa, not at {t[^1]:R} MPa"), nameof(t));
        for (int i = 1; i < w.Length; i++)
        {
            if (w[i] <= w[i - 1])
                throw new ArgumentException(Admissible.Text($"separations must rise: point {i} has {w[i]:R} mm after {w[i - 1]:R} mm"), nameof(w));
            if (i < w.Length - 1 && t[i] <= 0)
                throw new ArgumentException(Admissible.Text($"traction must be above 0 between the ends: point {i} has {t[i]:R} MPa"), nameof(t));
            // A last digit of slack: points on one line through the origin are allowed.
            if (i > 1 && t[i] / w[i] > t[i - 1] / w[i - 1] * (1 + 1e-12))
                throw new ArgumentException(Admissible.Text($"traction over separation must not rise (damage would fall): point {i} has {t[i] / w[i]:R} MPa/mm after {t[i - 1] / w[i - 1]:R} MPa/mm"), nameof(t));
        }
    }
}
