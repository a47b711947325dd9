namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Peel curve of a layer with unvented cavities at an ambient pressure p that differs from the pressure p_ref of the test: T(w) = T_ref(w) + (p - p_ref)·χ(w), χ the area share of unvented
/// cavities, by points joined by straight lines, 0 up to cavitation and from venting on. Toughness Γ = Γ_ref + (p - p_ref)·∫χ dw, exact. Statement of the project (a pressure on all wetted faces
/// balances itself; the cavities are the part it cannot reach).
/// </summary>
public sealed class CavityCurve : ITractionCurve
{
    private const int Samples = 2000;
    private readonly ITractionCurve _reference;
    private readonly double[] _openings;
    private readonly double[] _shares;
    private readonly double[] _areas;
    private readonly double _pressure;

    /// <summary>Curve from that of the test and the share of cavities.</summary>
    /// <param name="reference">Curve at the pressure of the test.</param>
    /// <param name="openings">Openings [mm], at least three, rising from at least 0, the last at most the final separation.</param>
    /// <param name="shares">χ there, 0 first and last, 0 to 1 between.</param>
    /// <param name="pressureChange">p - p_ref [MPa].</param>
    /// <exception cref="ArgumentNullException">The curve is missing.</exception>
    /// <exception cref="ArgumentException">The points break a rule, or the traction falls to 0 before its end, or traction over opening rises; the message names the opening.</exception>
    public CavityCurve(ITractionCurve reference, ReadOnlySpan<double> openings, ReadOnlySpan<double> shares, double pressureChange)
    {
        ArgumentNullException.ThrowIfNull(reference);
        Check(openings, shares, reference.FinalSeparation);
        if (!double.IsFinite(pressureChange))
            throw new ArgumentOutOfRangeException(nameof(pressureChange), pressureChange, "pressureChange must be finite");
        _reference = reference;
        _openings = openings.ToArray();
        _shares = shares.ToArray();
        _areas = new double[_openings.Length];
        for (int i = 1; i < _areas.Length; i++)
            _areas[i] = _areas[i - 1] + 0.5 * (_shares[i] + _shares[i - 1]) * (_openings[i] - _openings[i - 1]);
        _pressure = pressureChange;
        int onset = 0;
        while (onset + 1 < _shares.Length && _shares[onset + 1] == 0)
            onset++;
        ElasticLimit = Math.Min(reference.ElasticLimit, _openings[onset]);
        if (!(ElasticLimit > 0))
            throw new ArgumentException("cavities must begin above an opening of 0 mm, else the curve has no elastic part", nameof(openings));
        Toughness = Admissible.Positive(reference.Toughness + pressureChange * _areas[^1], "toughness at this pressure");
        (PeakSeparation, Strength) = CheckShape();
    }

    /// <inheritdoc/>
    public double ElasticLimit { get; }

    /// <inheritdoc/>
    public double FinalSeparation => _reference.FinalSeparation;

    /// <inheritdoc/>
    public double Stiffness => _reference.Stiffness;

    /// <inheritdoc/>
    public double Strength { get; }

    /// <inheritdoc/>
    public double Toughness { get; }

    /// <inheritdoc/>
    public double PeakSeparation { get; }

    /// <inheritdoc/>
    public double Traction(double separation) => _reference.Traction(separation) + _pressure * Share(separation);

    /// <inheritdoc/>
    public double Slope(double separation)
    {
        int i = SegmentOf(separation);
        return _reference.Slope(separation) + (i < 0 ? 0 : _pressure * (_shares[i + 1] - _shares[i]) / (_openings[i + 1] - _openings[i]));
    }

    /// <inheritdoc/>
    public double Area(double separation)
    {
        int i = SegmentOf(separation);
        double area = i >= 0 ? _areas[i] + 0.5 * (separation - _openings[i]) * (_shares[i] + Share(separation)) : separation < _openings[0] ? 0 : _areas[^1];
        return _reference.Area(separation) + _pressure * area;
    }

    private double Share(double separation)
    {
        int i = SegmentOf(separation);
        return i < 0 ? 0 : _shares[i] + (_shares[i + 1] - _shares[i]) * ((separation - _openings[i]) / (_openings[i + 1] - _openings[i]));
    }

    /// <summary>Segment that holds an opening, from its left point on; -1 outside.</summary>
    private int SegmentOf(double separation)
    {
        if (!(separation >= _openings[0]) || separation >= _openings[^1])
            return -1;
        int i = _openings.Length - 2;
        while (_openings[i] > separation)
            i--;
        return i;
    }

    /// <summary>Largest traction and where; refuses tractions of 0 or less and a rising traction over opening, at many openings and at the points of χ.</summary>
    private (double Opening, double Traction) CheckShape()
    {
        double[] at = [.. Enumerable.Range(1, Samples - 1).Select(i => FinalSeparation * i / Samples).Concat(_openings.Where(w => w > 0 && w < FinalSeparation)).Append(ElasticLimit).Append(_reference.PeakSeparation).Order()];
        (double peakAt, double peak, double secant) = (ElasticLimit, Traction(ElasticLimit), Stiffness);
        foreach (double w in at)
        {
            double traction = Traction(w);
            if (!(traction > 0))
                throw new ArgumentException(Admissible.Text($"at this pressure the peel traction falls to {traction:G4} MPa at an opening of {w:G4} mm, before the end of the curve"), nameof(w));
            if (traction / w > secant * (1 + 1e-9))
                throw new ArgumentException(Admissible.Text($"at this pressure traction over opening rises near {w:G4} mm, to {traction / w:G4} MPa/mm: damage would fall; let the share of cavities grow over a longer opening"), nameof(w));
            secant = traction / w;
            if (traction > peak)
                (peakAt, peak) = (w, traction);
        }
        return (peakAt, peak);
    }

    private static void Check(ReadOnlySpan<double> w, ReadOnlySpan<double> share, double final)
    {
        if (w.Length != share.Length || w.Length < 3)
            throw new ArgumentException(Admissible.Text($"cavities need as many shares as openings and at least 3 points; there are {w.Length} openings and {share.Length} shares"), nameof(w));
        for (int i = 0; i < w.Length; i++)
        {
            if (!(share[i] is >= 0 and <= 1) || !(w[i] >= 0))
                throw new ArgumentException(Admissible.Text($"point {i} of the cavities is ({w[i]:R} mm, {share[i]:R}): needed are an opening of at least 0 and a share from 0 to 1"), nameof(share));
            if (i > 0 && w[i] <= w[i - 1])
                throw new ArgumentException(Admissible.Text($"openings must rise: point {i} has {w[i]:R} mm after {w[i - 1]:R} mm"), nameof(w));
        }
        if (share[0] != 0 || share[^1] != 0)
            throw new ArgumentException("the share of cavities must be 0 at the first point (cavitation) and at the last (vented)", nameof(share));
        if (w[^1] > final)
            throw new ArgumentException(Admissible.Text($"cavities must be vented by the end of the peel curve, {final:G6} mm; the last point is at {w[^1]:G6} mm"), nameof(w));
    }
}
