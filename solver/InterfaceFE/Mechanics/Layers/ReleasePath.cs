namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Integrals along a straight stride on the release branch. Between kinks the separations are linear, the carriers' tractions linear, q quadratic and s quadratic in
/// the progress, so every integrand here is at most cubic and two Gauss points per piece are exact.
/// </summary>
internal struct ReleasePath
{
    private const double Gauss = 0.28867513459481288;

    /// <summary>A share s below this is rounding: the point is separated, so that a stride that ends exactly at the final separation is.</summary>
    private const double NothingLeft = 1e-12;

    /// <summary>Integral of t_I dx_I [N/mm].</summary>
    public double PeelWork { get; private set; }

    /// <summary>Integral of t_II dx_II [N/mm].</summary>
    public double ShearWork { get; private set; }

    /// <summary>Integral of -½·x_i²·d(s·k_i) over both modes [N/mm], ≥ 0 term by term.</summary>
    public double Dissipated { get; private set; }

    /// <summary>Integral of progress·(d peel/d sliding - d shear/d opening) d progress [MPa/mm]: what the skew tangent adds to the gradient of the work.</summary>
    public double SkewMoment { get; private set; }

    /// <summary>q at the end.</summary>
    public double Spent { get; private set; }

    /// <summary>Largest q.</summary>
    public double MostSpent { get; private set; }

    /// <summary>Largest opening [mm].</summary>
    public double LargestOpening { get; private set; }

    /// <summary>Largest sliding [mm].</summary>
    public double LargestSliding { get; private set; }

    /// <summary>Whether s reached 0.</summary>
    public bool Separated { get; private set; }

    /// <summary>Follows the branch from a progress to the end of the stride or to separation.</summary>
    public static ReleasePath Follow(in ReleaseBranch branch, in Stride stride, double from, double largestOpening, double largestSliding, double spent, double mostSpent)
    {
        ReleasePath path = new() { Spent = spent, MostSpent = mostSpent, LargestOpening = largestOpening, LargestSliding = largestSliding };
        Span<double> kinks = stackalloc double[9];
        int count = Kinks(branch, stride, from, largestOpening, largestSliding, kinks);
        for (int i = 0; i + 1 < count && !path.Separated; i++)
            path.Piece(branch, stride, kinks[i], kinks[i + 1]);
        path.LargestOpening = Math.Max(largestOpening, stride.To.Opening);
        path.LargestSliding = Math.Max(largestSliding, Math.Abs(stride.To.Sliding));
        return path;
    }

    private static int Kinks(in ReleaseBranch branch, in Stride stride, double from, double largestOpening, double largestSliding, Span<double> kinks)
    {
        kinks[0] = from;
        int count = 1;
        double dw = stride.OpeningChange, dv = stride.SlidingChange, w = stride.From.Opening, v = stride.From.Sliding;
        Insert(-w / dw, kinks, ref count);
        Insert((largestOpening - w) / dw, kinks, ref count);
        Insert((branch.Peel.Limit - w) / dw, kinks, ref count);
        Insert(-v / dv, kinks, ref count);
        double sense = stride.To.Sliding < 0 ? -1 : 1;
        Insert((sense * largestSliding - v) / dv, kinks, ref count);
        Insert((sense * branch.Shear.Limit - v) / dv, kinks, ref count);
        kinks[count++] = 1;
        return count;
    }

    private static void Insert(double progress, Span<double> kinks, ref int count)
    {
        if (!(progress > kinks[0] && progress < 1))
            return;
        int at = count++;
        while (kinks[at - 1] > progress)
        {
            kinks[at] = kinks[at - 1];
            at--;
        }
        kinks[at] = progress;
    }

    /// <summary>One piece without kinks: first the part in which q stays below its largest value, then the part in which it grows.</summary>
    private void Piece(in ReleaseBranch branch, in Stride stride, double a, double b)
    {
        Separation za = stride.At(a), zb = stride.At(b);
        double wa = Math.Max(za.Opening, 0), wb = Math.Max(zb.Opening, 0), va = Math.Abs(za.Sliding), vb = Math.Abs(zb.Sliding);
        double peelA = branch.Peel.Traction(wa, LargestOpening), peelB = branch.Peel.Traction(wb, Math.Max(LargestOpening, wb));
        double shearA = branch.Shear.Traction(va, LargestSliding), shearB = branch.Shear.Traction(vb, Math.Max(LargestSliding, vb));
        double first = peelA * (wb - wa) / branch.PeelToughness + shearA * (vb - va) / branch.ShearToughness;
        double last = peelB * (wb - wa) / branch.PeelToughness + shearB * (vb - va) / branch.ShearToughness;
        double start = Spent, end = start + 0.5 * (first + last);
        double grows = end > MostSpent ? UpwardRoot(0.5 * (last - first), first, MostSpent - start) : 1;
        bool separates = end >= 2 * branch.Due * (1 - NothingLeft);
        double stops = separates ? UpwardRoot(0.5 * (last - first), first, Math.Min(end, 2 * branch.Due) - start) : 1;
        PieceSums sums = new(wa, wb - wa, va, vb - va, start, first, 0.5 * (last - first));
        if (grows > 0)
            Integrate(branch, stride, sums, a, b, 0, grows, false);
        MostSpent = Math.Max(MostSpent, Math.Min(end, 2 * branch.Due));
        if (grows < stops)
            Integrate(branch, stride, sums, a, b, grows, stops, true);
        Separated = separates;
        Spent = Separated ? 2 * branch.Due : end;
        LargestOpening = Math.Max(LargestOpening, wb);
        LargestSliding = Math.Max(LargestSliding, vb);
    }

    private readonly record struct PieceSums(double Opening, double OpeningChange, double Sliding, double SlidingChange, double Spent, double First, double Second);

    private void Integrate(in ReleaseBranch branch, in Stride stride, in PieceSums piece, double a, double b, double low, double high, bool growing)
    {
        double half = 0.5 * (high - low);
        LayerResponse answer = default;
        for (int g = -1; g <= 1; g += 2)
        {
            double mu = 0.5 * (low + high) + g * Gauss * (high - low);
            double w = piece.Opening + mu * piece.OpeningChange, v = piece.Sliding + mu * piece.SlidingChange;
            double spent = piece.Spent + mu * (piece.First + mu * piece.Second);
            double share = branch.Share(growing ? spent : MostSpent);
            double peel = branch.Peel.Traction(w, LargestOpening), shear = branch.Shear.Traction(v, LargestSliding);
            double peelWork = peel * piece.OpeningChange, shearWork = shear * piece.SlidingChange;
            PeelWork += half * share * peelWork;
            ShearWork += half * share * shearWork;
            // The carrier's own loss on its flat part: ½·c_M dx.
            double loss = (branch.Peel.IsFlat(w, LargestOpening) ? share * Math.Max(0, peelWork) : 0) + (branch.Shear.IsFlat(v, LargestSliding) ? share * Math.Max(0, shearWork) : 0);
            if (growing)
                loss += (peel * w + shear * v) * Math.Max(0, piece.First + 2 * mu * piece.Second) / (2 * branch.Due);
            Dissipated += half * 0.5 * loss;
            if (branch.PeelToughness == branch.ShearToughness && !branch.Motion.Moves)
                continue;
            double progress = a + mu * (b - a);
            branch.Evaluate(stride.At(progress), LargestOpening, LargestSliding, spent, growing ? spent : MostSpent, progress, ref answer);
            SkewMoment += half * (b - a) * progress * (answer.PeelBySliding - answer.ShearByOpening);
        }
    }

    /// <summary>The larger root of second·x² + first·x = level with second ≥ 0, level ≥ 0, within 0 to 1; free of cancellation and overflow.</summary>
    private static double UpwardRoot(double second, double first, double level)
    {
        double size = Math.Max(Math.Max(Math.Abs(second), Math.Abs(first)), level);
        if (!(size > 0) || level < 0)
            return 0;
        second = Math.Max(0, second / size);
        first /= size;
        level /= size;
        double root = Math.Sqrt(first * first + 4 * second * level);
        double x = first >= 0 ? 2 * level / (first + root) : (root - first) / (2 * second);
        return x is >= 0 and <= 1 ? x : x > 1 ? 1 : 0;
    }
}
