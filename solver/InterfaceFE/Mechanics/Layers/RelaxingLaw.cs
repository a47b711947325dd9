namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// A law whose tractions relax by a Prony series: with the secant stiffness k = t/x of the law without relaxation at the same separations, the traction of a mode is
/// k·(p∞·x + Σ p_n·q_n), p∞ = 1 - Σ p_n, q_n the elastic part of a Maxwell element: dq_n/dt = dx/dt - q_n/(a(T)·τ_n). Undamaged, that is the Prony series on the traction; the stiffness of the law
/// is the instantaneous one. Contact does not relax.
/// </summary>
/// <remarks>
/// Damage and the shares of the toughness follow the separations as without relaxation. Stored ½·k·(p∞·x² + Σ p_n·q_n²) ≥ 0; dissipated is the viscous part and that of damage, ≥ 0 both, because k
/// never rises. Over a stride separations move in proportion to time, so that q_n is exact: q·e + Δx·(1 - e)/θ, e = exp(-θ), θ = time stride over a·τ_n with the mean of 1/a at both ends. What is
/// dissipated is that of the law without relaxation plus work less stored energy of the difference by the trapezoidal rule, second order in the stride.
/// Laws that unload to the origin only: a plastic separation has no secant.
/// </remarks>
public sealed class RelaxingLaw : WrappedLaw
{
    private const int Opening = 0, Sliding = 1, Temperature = 2, PeelLess = 3, ShearLess = 4, StoredLess = 5, Lost = 6, LostWithout = 7, Own = 8, MostTerms = 16;

    /// <summary>Share of the final separation below which secants are taken at that share.</summary>
    private const double Nearly = 1e-9;

    private readonly double[] _shares;
    private readonly double[] _times;
    private readonly double _lasting;
    private readonly TimeShift _shift;

    /// <summary>A law with relaxation.</summary>
    /// <param name="inner">Law without relaxation; unloads to the origin.</param>
    /// <param name="shares">p_n, each above 0, sum at most 1; 1 to 16 of them.</param>
    /// <param name="times">τ_n at the reference temperature [s], above 0, as many.</param>
    /// <param name="shift">How the times move with temperature.</param>
    /// <exception cref="ArgumentNullException">Law or shift is missing.</exception>
    /// <exception cref="ArgumentException">The numbers are outside their range.</exception>
    public RelaxingLaw(ILayerLaw inner, ReadOnlySpan<double> shares, ReadOnlySpan<double> times, TimeShift shift)
        : base(inner)
    {
        ArgumentNullException.ThrowIfNull(shift);
        if (shares.Length != times.Length || shares.Length is < 1 or > MostTerms)
            throw new ArgumentException(Admissible.Text($"relaxation needs as many shares as times, 1 to {MostTerms}; there are {shares.Length} shares and {times.Length} times"), nameof(shares));
        double sum = 0;
        for (int i = 0; i < shares.Length; i++)
        {
            sum += Admissible.Positive(shares[i], nameof(shares));
            Admissible.Positive(times[i], nameof(times));
        }
        // A last digit of slack: shares that are meant to sum to 1.
        if (sum > 1 + 1e-12)
            throw new ArgumentException(Admissible.Text($"the shares of relaxation sum to {sum:R}; at most 1 can relax"), nameof(shares));
        _shares = shares.ToArray();
        _times = times.ToArray();
        _lasting = Math.Max(0, 1 - sum);
        _shift = shift;
    }

    /// <inheritdoc/>
    public override int StateSize => Inner.StateSize + Own + 2 * _shares.Length;

    /// <inheritdoc/>
    public override bool HasSymmetricTangent => false;

    /// <inheritdoc/>
    public override bool DependsOnTime => true;

    /// <inheritdoc/>
    public override LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        int size = Inner.StateSize;
        ReadOnlySpan<double> before = accepted.Slice(size, Own), peelBefore = accepted.Slice(size + Own, _shares.Length), shearBefore = accepted.Slice(size + Own + _shares.Length, _shares.Length);
        Span<double> state = tentative.Slice(size, Own), peelAfter = tentative.Slice(size + Own, _shares.Length), shearAfter = tentative.Slice(size + Own + _shares.Length, _shares.Length);
        bool open = !(separation.Opening < 0);
        double w = open ? separation.Opening : 0, v = separation.Sliding;
        // Secants and their derivatives, at separations next to zero where there is none: pressed together the elastic parts still pull.
        double leastOpening = Nearly * FinalOpening, leastSliding = Math.CopySign(Nearly * FinalSliding, v);
        bool touches = !(w >= leastOpening), still = !(Math.Abs(v) >= Math.Abs(leastSliding));
        double x = touches ? leastOpening : w, y = still ? leastSliding : v;
        LayerResponse opened = touches ? Inner.Update(new Separation(x, v), at, accepted[..size], tentative[..size]) : default;
        LayerResponse slid = still ? Inner.Update(new Separation(separation.Opening, y), at, accepted[..size], tentative[..size]) : default;
        LayerResponse answer = Inner.Update(separation, at, accepted[..size], tentative[..size]);
        if (!touches)
            opened = answer;
        if (!still)
            slid = answer;
        double peelIn = open ? answer.Peel : 0, shearIn = answer.Shear, peelSecant = opened.Peel / x, shearSecant = slid.Shear / y;
        double peelByW = touches ? 0 : (opened.PeelByOpening - peelSecant) / x, peelByV = opened.PeelBySliding / x;
        double shearByW = slid.ShearByOpening / y, shearByV = still ? 0 : (slid.ShearBySliding - shearSecant) / y;

        double first = before[Temperature] > 0 ? before[Temperature] : at.Temperature;
        double reduced = at.TimeStride > 0 ? at.TimeStride * 0.5 * (_shift.Speed(first) + _shift.Speed(at.Temperature)) : 0;
        double lastOpening = Math.Max(0, before[Opening]), openingChange = w - lastOpening, slidingChange = v - before[Sliding];
        Elements peel = Advance(w, openingChange, reduced, peelBefore, peelAfter), shear = Advance(v, slidingChange, reduced, shearBefore, shearAfter);

        double peelNow = peelSecant * peel.Pull, shearNow = shearSecant * shear.Pull;
        double peelByOpening = open ? peelByW * peel.Pull + peelSecant * peel.PullSlope : 0, peelBySliding = peelByV * peel.Pull;
        double shearByOpening = shearByW * shear.Pull, shearBySliding = shearByV * shear.Pull + shearSecant * shear.PullSlope;
        double peelLess = peelNow - peelIn, shearLess = shearNow - shearIn;
        double storedLess = 0.5 * (peelSecant * (peel.Square - w * w) + shearSecant * (shear.Square - v * v));
        double lost = answer.Dissipated - before[LostWithout] + 0.5 * ((before[PeelLess] + peelLess) * openingChange + (before[ShearLess] + shearLess) * slidingChange) - (storedLess - before[StoredLess]);
        double storedByOpening = 0.5 * (peelByW * (peel.Square - w * w) + shearByW * (shear.Square - v * v)) + peelSecant * (peel.SquareSlope - w);
        double storedBySliding = 0.5 * (peelByV * (peel.Square - w * w) + shearByV * (shear.Square - v * v)) + shearSecant * (shear.SquareSlope - v);
        if (open)
            answer.DissipatedByOpening += 0.5 * (before[PeelLess] + peelLess + openingChange * (peelByOpening - answer.PeelByOpening) + slidingChange * (shearByOpening - answer.ShearByOpening)) - storedByOpening;
        answer.DissipatedBySliding += 0.5 * (before[ShearLess] + shearLess + openingChange * (peelBySliding - answer.PeelBySliding) + slidingChange * (shearBySliding - answer.ShearBySliding)) - storedBySliding;
        state[Opening] = separation.Opening;
        state[Sliding] = v;
        state[Temperature] = at.Temperature;
        state[PeelLess] = peelLess;
        state[ShearLess] = shearLess;
        state[StoredLess] = storedLess;
        state[Lost] = before[Lost] + Math.Max(0, lost);
        state[LostWithout] = answer.Dissipated;
        answer.Peel += peelLess;
        answer.Shear = shearNow;
        answer.PeelByOpening = open ? peelByOpening : answer.PeelByOpening;
        answer.PeelBySliding = peelBySliding;
        answer.ShearByOpening = shearByOpening;
        answer.ShearBySliding = shearBySliding;
        answer.Stored += storedLess;
        answer.Dissipated = state[Lost];
        return answer;
    }

    /// <summary>Sums over the Maxwell elements of a mode.</summary>
    /// <param name="Pull">p∞·x + Σ p·q [mm].</param>
    /// <param name="PullSlope">Its derivative by x.</param>
    /// <param name="Square">p∞·x² + Σ p·q² [mm²].</param>
    /// <param name="SquareSlope">Half its derivative by x [mm].</param>
    private readonly record struct Elements(double Pull, double PullSlope, double Square, double SquareSlope);

    private Elements Advance(double x, double change, double reduced, ReadOnlySpan<double> before, Span<double> after)
    {
        double pull = _lasting * x, slope = _lasting, square = _lasting * x * x, squareSlope = _lasting * x;
        for (int n = 0; n < _shares.Length; n++)
        {
            double theta = reduced / _times[n];
            double kept = Math.Exp(-theta), gain = theta > 0 ? (1 - kept) / theta : 1;
            // Short strides: the quotient without cancellation.
            if (theta < 1e-5)
                gain = 1 - 0.5 * theta;
            double q = kept * before[n] + gain * change;
            after[n] = q;
            pull += _shares[n] * q;
            slope += _shares[n] * gain;
            square += _shares[n] * q * q;
            squareSlope += _shares[n] * q * gain;
        }
        return new Elements(pull, slope, square, squareSlope);
    }
}
