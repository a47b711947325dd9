namespace InterfaceFE.Mechanics.Layers;

/// <summary>Secant stiffnesses at joint maxima M (opening) and N (amount of sliding), and their derivatives.</summary>
/// <param name="Peel">T_I(M, N)/M [MPa/mm].</param>
/// <param name="Shear">T_II(M, N)/N [MPa/mm].</param>
/// <param name="PeelByOpening">d/dM of the first [MPa/mm²].</param>
/// <param name="PeelBySliding">d/dN of the first [MPa/mm²].</param>
/// <param name="ShearByOpening">d/dM of the second [MPa/mm²].</param>
/// <param name="ShearBySliding">d/dN of the second [MPa/mm²].</param>
internal readonly record struct PotentialSecants(double Peel, double Shear, double PeelByOpening, double PeelBySliding, double ShearByOpening, double ShearBySliding);

/// <summary>What a stride loses.</summary>
/// <param name="Peel">-½∫w²·dk_I [N/mm].</param>
/// <param name="Shear">-½∫v²·dk_II [N/mm].</param>
/// <param name="SkewMoment">Integral of progress·(d peel/d sliding - d shear/d opening) d progress [MPa/mm].</param>
internal readonly record struct PathLoss(double Peel, double Shear, double SkewMoment);

/// <summary>Secants of the coupled potential and its dissipation along straight strides.</summary>
internal sealed class PotentialPath
{
    private static readonly double[] Nodes = [-0.9602898564975363, -0.7966664774136267, -0.5255324099163290, -0.1834346424956498, 0.1834346424956498, 0.5255324099163290, 0.7966664774136267, 0.9602898564975363];
    private static readonly double[] Weights = [0.1012285362903763, 0.2223810344533745, 0.3137066458778873, 0.3626837833783620, 0.3626837833783620, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];

    private readonly PotentialMode _peel;
    private readonly PotentialMode _shear;
    private readonly double _least;
    private readonly double _peelExcess;
    private readonly double _shearExcess;
    private readonly double _openingAlone;
    private readonly double _slidingAlone;

    public PotentialPath(PotentialMode peel, PotentialMode shear)
    {
        _peel = peel;
        _shear = shear;
        _least = Math.Min(peel.Toughness, shear.Toughness);
        _peelExcess = Math.Max(0, peel.Toughness - shear.Toughness);
        _shearExcess = Math.Max(0, shear.Toughness - peel.Toughness);
        _openingAlone = peel.FinalSeparation * peel.WhereLeft(_peelExcess / peel.Toughness);
        _slidingAlone = shear.FinalSeparation * shear.WhereLeft(_shearExcess / shear.Toughness);
    }

    /// <summary>Secants at joint maxima.</summary>
    public PotentialSecants At(double opening, double sliding)
    {
        double x = opening / _peel.FinalSeparation, y = sliding / _shear.FinalSeparation;
        double a = Math.Max(0, PeelLeft(opening)) / _least, b = Math.Max(0, ShearLeft(sliding)) / _least;
        double peel = _peel.Toughness / (_peel.FinalSeparation * _peel.FinalSeparation), shear = _shear.Toughness / (_shear.FinalSeparation * _shear.FinalSeparation);
        double peelSecant = peel * _peel.Secant(x), shearSecant = shear * _shear.Secant(y);
        return new PotentialSecants(
            peelSecant * b,
            shearSecant * a,
            peel * _peel.SecantSlope(x) / _peel.FinalSeparation * b,
            b > 0 ? -peelSecant * shearSecant * sliding / _least : 0,
            a > 0 ? -shearSecant * peelSecant * opening / _least : 0,
            shear * _shear.SecantSlope(y) / _shear.FinalSeparation * a);
    }

    /// <summary>Loss along a straight stride from maxima, up to separation.</summary>
    public PathLoss Along(in Stride stride, double opening, double sliding)
    {
        Span<double> kinks = stackalloc double[22];
        int count = 1;
        kinks[0] = 0;
        double end = Math.Min(1, Math.Min(stride.ReachesOpening(_peel.FinalSeparation), stride.ReachesSliding(_shear.FinalSeparation)));
        double w = stride.From.Opening, dw = stride.OpeningChange, v = stride.From.Sliding, dv = stride.SlidingChange, sense = stride.To.Sliding < 0 ? -1 : 1;
        Insert(-w / dw, end, kinks, ref count);
        Insert(-v / dv, end, kinks, ref count);
        foreach (double at in (ReadOnlySpan<double>)[opening, _openingAlone])
            Insert((at - w) / dw, end, kinks, ref count);
        foreach (double at in (ReadOnlySpan<double>)[sliding, _slidingAlone])
            Insert((sense * at - v) / dv, end, kinks, ref count);
        Grade(_peel, -w / dw, 1 / dw, end, kinks, ref count);
        Grade(_shear, -v / dv, sense / dv, end, kinks, ref count);
        kinks[count++] = end;
        PathLoss sum = default;
        for (int i = 0; i + 1 < count; i++)
        {
            PathLoss piece = Piece(stride, kinks[i], kinks[i + 1], opening, sliding);
            sum = new PathLoss(sum.Peel + piece.Peel, sum.Shear + piece.Shear, sum.SkewMoment + piece.SkewMoment);
        }
        // Neither part falls; what points leave as rounding goes to the other.
        return sum.Peel < 0 ? new PathLoss(0, Math.Max(0, sum.Peel + sum.Shear), sum.SkewMoment) : sum.Shear < 0 ? new PathLoss(Math.Max(0, sum.Peel + sum.Shear), 0, sum.SkewMoment) : sum;
    }

    private double PeelLeft(double opening) => _peel.Toughness * _peel.Left(opening / _peel.FinalSeparation) - _peelExcess;

    private double ShearLeft(double sliding) => _shear.Toughness * _shear.Left(sliding / _shear.FinalSeparation) - _shearExcess;

    private double PeelLeftSlope(double opening) => -_peel.Toughness * opening * _peel.Secant(opening / _peel.FinalSeparation) / (_peel.FinalSeparation * _peel.FinalSeparation);

    private double ShearLeftSlope(double sliding) => -_shear.Toughness * sliding * _shear.Secant(sliding / _shear.FinalSeparation) / (_shear.FinalSeparation * _shear.FinalSeparation);

    /// <summary>The rise is steep up to the square of the initial slope, and the end may be steep: cuts at both keep eight points exact enough.</summary>
    private static void Grade(PotentialMode mode, double offset, double scale, double end, Span<double> kinks, ref int count)
    {
        double slope = mode.InitialSlope;
        foreach (double share in (ReadOnlySpan<double>)[slope * slope, slope * Math.Sqrt(slope), slope, Math.Sqrt(slope), 0.9, 0.99])
            Insert(offset + scale * share * mode.FinalSeparation, end, kinks, ref count);
    }

    private static void Insert(double progress, double end, Span<double> kinks, ref int count)
    {
        if (!(progress > 0 && progress < end))
            return;
        int at = count++;
        while (kinks[at - 1] > progress)
        {
            kinks[at] = kinks[at - 1];
            at--;
        }
        kinks[at] = progress;
    }

    private PathLoss Piece(in Stride stride, double from, double to, double opening, double sliding)
    {
        Separation middle = stride.At(0.5 * (from + to));
        bool growsOpening = middle.Opening > opening, growsSliding = Math.Abs(middle.Sliding) > sliding;
        if (!(growsOpening || growsSliding) || to <= from)
            return default;
        (double openingA, double slidingA) = Maxima(stride.At(from), opening, sliding, growsOpening, growsSliding);
        (double openingB, double slidingB) = Maxima(stride.At(to), opening, sliding, growsOpening, growsSliding);
        double a = PeelLeft(openingA), b = ShearLeft(slidingA), aLast = PeelLeft(openingB), bLast = ShearLeft(slidingB);
        bool peelPulls = b + bLast > 0, shearPulls = a + aLast > 0;
        double half = 0.5 * (to - from), sense = middle.Sliding < 0 ? -1 : 1, openingRate = stride.OpeningChange, slidingRate = sense * stride.SlidingChange;
        double lost = 0, skew = 0, byPeel = 0, byShear = 0;
        for (int g = 0; g < Nodes.Length; g++)
        {
            double progress = 0.5 * (from + to) + half * Nodes[g], weight = half * Weights[g];
            Separation z = stride.At(progress);
            double w = Math.Max(0, z.Opening), v = Math.Abs(z.Sliding), largest = growsOpening ? w : opening, largestSliding = growsSliding ? v : sliding;
            PotentialSecants k = At(largest, largestSliding);
            // A mode that rests loses by the growth of the other.
            lost -= weight * (growsOpening ? 0.5 * v * v * k.ShearByOpening * openingRate : 0.5 * w * w * k.PeelBySliding * slidingRate);
            skew += weight * progress * sense * ((growsSliding ? w * k.PeelBySliding : 0) - (growsOpening ? v * k.ShearByOpening : 0));
            if (growsOpening && growsSliding)
            {
                byPeel -= weight * ShearLeft(largestSliding) * PeelLeftSlope(largest) * openingRate / _least;
                byShear -= weight * PeelLeft(largest) * ShearLeftSlope(largestSliding) * slidingRate / _least;
            }
        }
        double work = -(aLast * bLast - a * b) / _least, peel, shear;
        if (!growsSliding)
            (peel, shear) = (peelPulls ? work : 0, lost);
        else if (!growsOpening)
            (peel, shear) = (lost, shearPulls ? work : 0);
        else if (peelPulls)
            (peel, shear) = (work - byShear, shearPulls ? byShear : 0);
        else
            (peel, shear) = (0, work - byPeel);
        PotentialSecants first = At(openingA, slidingA), last = At(openingB, slidingB);
        double peelStored = growsOpening ? 0.5 * (last.Peel * openingB * openingB - first.Peel * openingA * openingA) : 0;
        double shearStored = growsSliding ? 0.5 * (last.Shear * slidingB * slidingB - first.Shear * slidingA * slidingA) : 0;
        return new PathLoss(peel - peelStored, shear - shearStored, skew);
    }

    private (double Opening, double Sliding) Maxima(in Separation z, double opening, double sliding, bool growsOpening, bool growsSliding) =>
        (growsOpening ? Snapped(Math.Max(0, z.Opening), _peel.FinalSeparation) : opening, growsSliding ? Snapped(Math.Abs(z.Sliding), _shear.FinalSeparation) : sliding);

    /// <summary>A stride that is cut at a final separation ends there, not a last digit before it: the end of a curve may be steep.</summary>
    private static double Snapped(double separation, double final) => separation >= final * (1 - 1e-13) ? final : separation;
}
