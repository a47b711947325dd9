namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Energy criterion of independent modes (Yang and Thouless 2001) with the energy of the release branch set aside:
/// f = sum G_i/Γ_i + R, R = sum ½·t_i·l_i/Γ_i the energy still due on release; release starts where f first reaches 1.
/// </summary>
internal sealed class EnergyCriterion
{
    private const int Samples = 16;
    private readonly ITractionCurve _peel;
    private readonly ITractionCurve _shear;
    private readonly EnergyCounting _counting;
    private readonly double _largestDue;
    private readonly double _peelPlastic;
    private readonly double _shearPlastic;

    public EnergyCriterion(ITractionCurve peel, ITractionCurve shear, double releaseShare, EnergyCounting counting, double peelPlasticShare, double shearPlasticShare)
    {
        _peelPlastic = peelPlasticShare;
        _shearPlastic = shearPlasticShare;
        _peel = peel;
        _shear = shear;
        _counting = counting;
        PeelRelease = releaseShare * peel.FinalSeparation;
        ShearRelease = releaseShare * shear.FinalSeparation;
        _largestDue = 0.5 * peel.Strength * PeelRelease / peel.Toughness + 0.5 * shear.Strength * ShearRelease / shear.Toughness;
    }

    /// <summary>Release length of peel [mm].</summary>
    public double PeelRelease { get; }

    /// <summary>Release length of shear [mm].</summary>
    public double ShearRelease { get; }

    /// <summary>G_i as counted [N/mm].</summary>
    public double Counted(ITractionCurve curve, in ModePoint mode)
    {
        double area = curve.Area(mode.Largest);
        if (_counting == EnergyCounting.LargestSeparation || mode.AtLargest)
            return area;
        return mode.Damaged ? area - 0.5 * mode.LargestTraction * mode.Reach + mode.Stored : mode.Stored;
    }

    /// <summary>Energy still due R at a point [-].</summary>
    public double Due(in ModePoint peel, in ModePoint shear) =>
        0.5 * peel.Traction * PeelRelease / _peel.Toughness + 0.5 * shear.Traction * ShearRelease / _shear.Toughness;

    /// <summary>f at a point [-].</summary>
    public double Value(in ModePoint peel, in ModePoint shear) =>
        Counted(_peel, peel) / _peel.Toughness + Counted(_shear, shear) / _shear.Toughness + Due(peel, shear);

    /// <summary>df/dx of peel [1/mm].</summary>
    public double PeelSlope(in ModePoint mode) => Slope(mode, PeelRelease, _peel.Toughness);

    /// <summary>df/dx of shear [1/mm].</summary>
    public double ShearSlope(in ModePoint mode) => Slope(mode, ShearRelease, _shear.Toughness);

    /// <summary>
    /// Where on the straight way, counted from the plastic separations, f first reaches 1: seen at sixteen samples up to the end (or to the final separation of a mode, where f is at least 1), then found to rounding.
    /// </summary>
    /// <returns>False when f stays below 1.</returns>
    public bool TryFindStart(in Stride stride, double largestOpening, double largestSliding, out double progress)
    {
        progress = 1;
        double openingMost = Most(_peel, _peelPlastic, Math.Max(0, stride.To.Opening), largestOpening), slidingMost = Most(_shear, _shearPlastic, Math.Abs(stride.To.Sliding), largestSliding);
        if (_peel.Area(openingMost) / _peel.Toughness + _shear.Area(slidingMost) / _shear.Toughness + _largestDue < 1)
            return false;
        double end = Math.Min(stride.ReachesOpening(Last(_peel, _peelPlastic, largestOpening)), stride.ReachesSliding(Last(_shear, _shearPlastic, largestSliding)));
        bool certain = end <= 1;
        end = Math.Min(end, 1);
        double low = 0;
        for (int i = 1; i <= Samples; i++)
        {
            double high = end * i / Samples;
            if ((certain && i == Samples) || Excess(stride, high, largestOpening, largestSliding, out _) >= 0)
            {
                progress = Root(stride, low, high, largestOpening, largestSliding);
                return true;
            }
            low = high;
        }
        return false;
    }

    /// <summary>Largest separation at a distance from the plastic separation.</summary>
    private static double Most(ITractionCurve curve, double plasticShare, double distance, double largest) =>
        plasticShare == 0 ? Math.Max(largest, distance) : largest + Math.Max(0, distance - ModePoint.ReachOf(curve, plasticShare, largest));

    /// <summary>Distance from the plastic separation at which the final separation is reached.</summary>
    private static double Last(ITractionCurve curve, double plasticShare, double largest) =>
        plasticShare == 0 ? curve.FinalSeparation : ModePoint.ReachOf(curve, plasticShare, largest) + (curve.FinalSeparation - largest);

    /// <summary>Newton's method within a bracket that is halved whenever it shrinks too slowly.</summary>
    private double Root(in Stride stride, double low, double high, double largestOpening, double largestSliding)
    {
        double at = 0.5 * (low + high), width = high - low;
        for (int i = 0; i < 120; i++)
        {
            double excess = Excess(stride, at, largestOpening, largestSliding, out double slope);
            if (excess == 0)
                return at;
            if (excess < 0)
                low = at;
            else
                high = at;
            double next = at - excess / slope;
            bool slow = i % 3 == 2 && high - low > 0.5 * width;
            if (i % 3 == 2)
                width = high - low;
            if (slow || !(next > low && next < high))
            {
                // A Newton step that no longer moves is the root to rounding.
                if (Math.Abs(next - at) <= 2e-16 * at)
                    return at;
                next = 0.5 * (low + high);
            }
            if (next == at || next <= low || next >= high || Math.Abs(next - at) <= 1e-16 * at)
                return next;
            at = next;
        }
        return at;
    }

    private double Excess(in Stride stride, double progress, double largestOpening, double largestSliding, out double slope)
    {
        Separation z = stride.At(progress);
        ModePoint peel = new(_peel, _peelPlastic, Math.Max(z.Opening, 0), largestOpening), shear = new(_shear, _shearPlastic, Math.Abs(z.Sliding), largestSliding);
        slope = (z.Opening >= 0 ? PeelSlope(peel) * stride.OpeningChange : 0) + ShearSlope(shear) * Math.CopySign(stride.SlidingChange, stride.SlidingChange * z.Sliding);
        return Value(peel, shear) - 1;
    }

    private double Slope(in ModePoint mode, double release, double toughness)
    {
        bool counts = mode.AtLargest || _counting == EnergyCounting.NetWork;
        return ((counts ? mode.Traction : 0) + 0.5 * release * mode.Slope) / toughness;
    }
}
