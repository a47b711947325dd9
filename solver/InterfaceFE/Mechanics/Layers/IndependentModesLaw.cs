namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Independent modes with energy criterion (Yang and Thouless 2001): until fracture each mode keeps its own curve, however far the other has softened; fracture where
/// G_I/Γ_I + G_II/Γ_II = 1. Release is a finite branch (<see cref="ReleaseBranch"/>, derived for the project): it starts where the criterion's sum with the energy still due
/// on it first reaches 1, both tractions then fall to 0 together, and the sum is exactly 1 at the end on any path.
/// </summary>
/// <remarks>
/// Unloading by the secant to the origin, or with a plastic share of a mode to its plastic separation (<see cref="ModePoint"/>). Closing below a plastic opening meets no resistance until the
/// faces touch; the release branch counts from the plastic separations at its start. Pressed together: contact stiffness at any damage, its energy counts as stored and in no criterion; sliding keeps its own state.
/// Damage before release: sum of dissipated_i/Γ_i, the share of the fracture energy already spent for good; from its value D0 at the start it runs as D0 + (1 - D0)·(1 - s) to 1.
/// Energies are exact for straight strides of any length, on the release branch too. At a separation equal to the largest one so far the growing tangent is given.
/// Where a mode's carrier grows on its flat part while the other unloads faster, the tangent is the derivative of that (0), not the secant.
/// </remarks>
public sealed class IndependentModesLaw : ILayerLaw
{
    private const int Opening = 0, Sliding = 1, LargestOpening = 2, LargestSliding = 3, Phase = 4, PeelLimit = 5, PeelHeld = 6, ShearLimit = 7, ShearHeld = 8,
        Due = 9, Spent = 10, MostSpent = 11, Dissipated = 12, StartDamage = 13, EnergyPeel = 14, EnergyShear = 15, PeelPlastic = 16, ShearPlastic = 17;

    private const double OnCurves = 0, OnRelease = 1, Apart = 2;

    private readonly ITractionCurve _peel;
    private readonly ITractionCurve _shear;
    private readonly double _contact;
    private readonly double _peelPlasticShare;
    private readonly double _shearPlasticShare;
    private readonly EnergyCriterion _criterion;

    /// <summary>Law from two curves.</summary>
    /// <param name="peel">Curve of peel.</param>
    /// <param name="shear">Curve of shear, the same in both senses.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <param name="releaseShare">Release length as a share of each mode's final separation, above 0, at most 0.5; small enough that the criterion is below 1 at each curve's strength.</param>
    /// <param name="counting">How G_i is counted.</param>
    /// <param name="peelPlasticShare">Plastic share of peel, 0 (secant to the origin) to 1 (initial stiffness).</param>
    /// <param name="shearPlasticShare">Plastic share of shear.</param>
    /// <exception cref="ArgumentNullException">A curve is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public IndependentModesLaw(ITractionCurve peel, ITractionCurve shear, double contactStiffness, double releaseShare = 0.05, EnergyCounting counting = EnergyCounting.LargestSeparation,
        double peelPlasticShare = 0, double shearPlasticShare = 0)
    {
        ArgumentNullException.ThrowIfNull(peel);
        ArgumentNullException.ThrowIfNull(shear);
        if (!Enum.IsDefined(counting))
            throw new ArgumentOutOfRangeException(nameof(counting), counting, "counting must be one of the named ways");
        _peel = peel;
        _shear = shear;
        _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));
        Admissible.Positive(releaseShare, nameof(releaseShare));
        Admissible.Within(releaseShare, 0, 0.5, nameof(releaseShare));
        CheckRelease(peel, releaseShare, "peel");
        CheckRelease(shear, releaseShare, "shear");
        _peelPlasticShare = Admissible.Within(peelPlasticShare, 0, 1, nameof(peelPlasticShare));
        _shearPlasticShare = Admissible.Within(shearPlasticShare, 0, 1, nameof(shearPlasticShare));
        _criterion = new EnergyCriterion(peel, shear, releaseShare, counting, peelPlasticShare, shearPlasticShare);
    }

    /// <inheritdoc/>
    public int StateSize => 18;

    /// <inheritdoc/>
    public bool HasSymmetricTangent => false;

    /// <inheritdoc/>
    public LayerStiffness Stiffness => new(_peel.Stiffness, _shear.Stiffness, _contact);

    /// <inheritdoc/>
    public double PeelToughness => _peel.Toughness;

    /// <inheritdoc/>
    public double ShearToughness => _shear.Toughness;

    /// <inheritdoc/>
    public double FinalOpening => _peel.FinalSeparation;

    /// <inheritdoc/>
    public double FinalSliding => _shear.FinalSeparation;

    /// <summary>Release share at which the criterion reaches 1 at the strength of a curve alone; a law needs less than that of either curve.</summary>
    /// <param name="curve">Curve of a mode.</param>
    /// <returns>2·(Γ - A(peak))/(S·wf).</returns>
    public static double LargestReleaseShare(ITractionCurve curve)
    {
        ArgumentNullException.ThrowIfNull(curve);
        return 2 * (curve.Toughness - curve.Area(curve.PeakSeparation)) / (curve.Strength * curve.FinalSeparation);
    }

    /// <inheritdoc/>
    public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        accepted[..StateSize].CopyTo(tentative);
        if (!double.IsFinite(separation.Opening) || !double.IsFinite(separation.Sliding))
            return NotFinite();
        tentative[Opening] = separation.Opening;
        tentative[Sliding] = separation.Sliding;
        Stride stride = new(new Separation(accepted[Opening], accepted[Sliding]), separation);
        LayerResponse answer = accepted[Phase] switch
        {
            OnCurves => FollowCurves(stride, accepted, tentative),
            OnRelease => FollowRelease(AcceptedBranch(accepted), stride.CountedFrom(accepted[PeelPlastic], accepted[ShearPlastic]), 0, tentative),
            _ => AnswerApart(tentative),
        };
        if (separation.Opening < 0)
        {
            answer.Peel += _contact * separation.Opening;
            answer.PeelByOpening += _contact;
            answer.Stored += 0.5 * _contact * separation.Opening * separation.Opening;
        }
        return answer;
    }

    private LayerResponse FollowCurves(in Stride way, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        Stride stride = way.CountedFrom(accepted[PeelPlastic], accepted[ShearPlastic]);
        double largestOpening = accepted[LargestOpening], largestSliding = accepted[LargestSliding];
        if (_criterion.TryFindStart(stride, largestOpening, largestSliding, out double start))
        {
            ReleaseBranch branch = StartRelease(stride, start, tentative);
            return branch.Due > 0 ? FollowRelease(branch, way.CountedFrom(tentative[PeelPlastic], tentative[ShearPlastic]), start, tentative) : AnswerApart(tentative);
        }
        bool open = stride.To.Opening >= 0;
        double sense = stride.To.Sliding < 0 ? -1 : 1;
        ModePoint peel = new(_peel, _peelPlasticShare, open ? stride.To.Opening : 0, largestOpening), shear = new(_shear, _shearPlasticShare, Math.Abs(stride.To.Sliding), largestSliding);
        double peelLoss = peel.Dissipated(_peel), shearLoss = shear.Dissipated(_shear);
        tentative[LargestOpening] = peel.Largest;
        tentative[LargestSliding] = shear.Largest;
        tentative[PeelPlastic] += peel.PlasticGrowth;
        tentative[ShearPlastic] += sense * shear.PlasticGrowth;
        tentative[Dissipated] = Math.Max(accepted[Dissipated], peelLoss + shearLoss);
        tentative[StartDamage] = Math.Max(accepted[StartDamage], peelLoss / _peel.Toughness + shearLoss / _shear.Toughness);
        return new LayerResponse
        {
            Peel = peel.Traction,
            Shear = sense * shear.Traction,
            PeelByOpening = open ? peel.Slope : 0,
            ShearBySliding = shear.Slope,
            Stored = peel.Stored + shear.Stored,
            Dissipated = tentative[Dissipated],
            DissipatedByOpening = open ? peel.DissipatedSlope : 0,
            DissipatedBySliding = sense * shear.DissipatedSlope,
            Damage = tentative[StartDamage],
            EnergyPeel = _criterion.Counted(_peel, peel),
            EnergyShear = _criterion.Counted(_shear, shear),
            Branch = peel.Growing || shear.Growing ? LawBranch.Growing : peel.Damaged || shear.Damaged ? LawBranch.Unloading : LawBranch.Elastic,
        };
    }

    /// <summary>Freezes what the branch needs at the start of release and puts the state of the start into the tentative state.</summary>
    private ReleaseBranch StartRelease(in Stride stride, double start, Span<double> state)
    {
        Separation z = stride.At(start);
        double sense = z.Sliding < 0 ? -1 : 1;
        ModePoint peel = new(_peel, _peelPlasticShare, Math.Max(z.Opening, 0), state[LargestOpening]);
        ModePoint shear = new(_shear, _shearPlasticShare, Math.Abs(z.Sliding), state[LargestSliding]);
        double peelLoss = peel.Dissipated(_peel), shearLoss = shear.Dissipated(_shear);
        // From here on distances count from the plastic separations.
        state[LargestOpening] = peel.Reach;
        state[LargestSliding] = shear.Reach;
        state[PeelPlastic] += peel.PlasticGrowth;
        state[ShearPlastic] += sense * shear.PlasticGrowth;
        state[PeelLimit] = peel.Damaged ? peel.Reach : _peel.ElasticLimit;
        state[ShearLimit] = shear.Damaged ? shear.Reach : _shear.ElasticLimit;
        state[PeelHeld] = _peel.Traction(Math.Max(peel.Largest, _peel.ElasticLimit));
        state[ShearHeld] = _shear.Traction(Math.Max(shear.Largest, _shear.ElasticLimit));
        state[Due] = _criterion.Due(peel, shear);
        state[Dissipated] = Math.Max(state[Dissipated], peelLoss + shearLoss);
        state[StartDamage] = Math.Clamp(peelLoss / _peel.Toughness + shearLoss / _shear.Toughness, state[StartDamage], 1);
        state[EnergyPeel] = _criterion.Counted(_peel, peel);
        state[EnergyShear] = _criterion.Counted(_shear, shear);
        return AcceptedBranch(state) with { Motion = MotionOf(stride, start, z.Opening >= 0, sense, peel, shear) };
    }

    private StartMotion MotionOf(in Stride stride, double start, bool open, double sense, in ModePoint peel, in ModePoint shear)
    {
        double gw = open ? _criterion.PeelSlope(peel) : 0, gv = sense * _criterion.ShearSlope(shear);
        double along = gw * stride.OpeningChange + gv * stride.SlidingChange;
        // A start that only touches 1 has no direction to move in.
        double w = along > 0 ? stride.OpeningChange / along : 0, v = along > 0 ? stride.SlidingChange / along : 0;
        return new StartMotion
        {
            Moves = start > 0,
            Opening = new ModeStart(peel.Separation, peel.Traction, peel.Growing ? peel.Slope : 0, 0.5 * _criterion.PeelRelease / _peel.Toughness * peel.Slope, peel.PlasticSlope),
            Sliding = new ModeStart(shear.Separation, shear.Traction, shear.Growing ? shear.Slope : 0, 0.5 * _criterion.ShearRelease / _shear.Toughness * shear.Slope, shear.PlasticSlope),
            Sense = sense,
            OpeningByOpening = open ? start * (1 - w * gw) : 0,
            OpeningBySliding = open ? -start * w * gv : 0,
            SlidingByOpening = -start * v * gw,
            SlidingBySliding = start * (1 - v * gv),
        };
    }

    private ReleaseBranch AcceptedBranch(ReadOnlySpan<double> state) => new()
    {
        Peel = new Carrier(state[PeelLimit], state[PeelHeld]),
        Shear = new Carrier(state[ShearLimit], state[ShearHeld]),
        Due = state[Due],
        PeelToughness = _peel.Toughness,
        ShearToughness = _shear.Toughness,
    };

    private static LayerResponse FollowRelease(in ReleaseBranch branch, in Stride stride, double from, Span<double> state)
    {
        double before = state[Dissipated];
        ReleasePath path = ReleasePath.Follow(branch, stride, from, state[LargestOpening], state[LargestSliding], state[Spent], state[MostSpent]);
        LayerResponse answer = default;
        if (!path.Separated)
            branch.Evaluate(stride.To, state[LargestOpening], state[LargestSliding], path.Spent, path.MostSpent, 1, ref answer);
        bool grew = path.MostSpent > state[MostSpent] || path.Spent >= path.MostSpent || path.Dissipated > 0;
        state[Phase] = path.Separated ? Apart : OnRelease;
        state[LargestOpening] = path.LargestOpening;
        state[LargestSliding] = path.LargestSliding;
        state[Spent] = path.Spent;
        state[MostSpent] = path.MostSpent;
        state[Dissipated] = before + path.Dissipated;
        state[EnergyPeel] += path.PeelWork;
        state[EnergyShear] += path.ShearWork;
        double opening = Math.Max(stride.To.Opening, 0), sliding = stride.To.Sliding;
        answer.Stored = 0.5 * (answer.Peel * opening + answer.Shear * sliding);
        answer.Dissipated = state[Dissipated];
        if (grew)
        {
            // Dissipated = work - change of stored; the work's gradient is the traction plus what the skew tangent leaves along the way.
            answer.DissipatedByOpening = 0.5 * (answer.Peel - opening * answer.PeelByOpening - sliding * answer.ShearByOpening) - stride.SlidingChange * path.SkewMoment;
            answer.DissipatedBySliding = 0.5 * (answer.Shear - opening * answer.PeelBySliding - sliding * answer.ShearBySliding) + stride.OpeningChange * path.SkewMoment;
        }
        if (grew && branch.Motion.Moves)
        {
            // The plastic separations, from which stored energy counts, move with the start.
            double byOpening = 0.5 * answer.Peel * branch.Motion.Opening.PlasticSlope, bySliding = 0.5 * answer.Shear * branch.Motion.Sliding.PlasticSlope;
            answer.DissipatedByOpening += byOpening * branch.Motion.OpeningByOpening + bySliding * branch.Motion.SlidingByOpening;
            answer.DissipatedBySliding += byOpening * branch.Motion.OpeningBySliding + bySliding * branch.Motion.SlidingBySliding;
        }
        double share = path.Separated ? 0 : branch.Share(path.MostSpent);
        answer.Damage = state[StartDamage] + (1 - state[StartDamage]) * (1 - share);
        answer.EnergyPeel = state[EnergyPeel];
        answer.EnergyShear = state[EnergyShear];
        answer.Branch = path.Separated ? LawBranch.Separated : path.Spent >= path.MostSpent ? LawBranch.Releasing : LawBranch.Unloading;
        return answer;
    }

    private static LayerResponse AnswerApart(Span<double> state)
    {
        state[Phase] = Apart;
        state[LargestOpening] = Math.Max(state[LargestOpening], state[Opening]);
        state[LargestSliding] = Math.Max(state[LargestSliding], Math.Abs(state[Sliding]));
        return new LayerResponse
        {
            Dissipated = state[Dissipated],
            Damage = 1,
            EnergyPeel = state[EnergyPeel],
            EnergyShear = state[EnergyShear],
            Branch = LawBranch.Separated,
        };
    }

    private static void CheckRelease(ITractionCurve curve, double releaseShare, string mode)
    {
        double most = LargestReleaseShare(curve);
        if (releaseShare >= most)
            throw new ArgumentOutOfRangeException(nameof(releaseShare), releaseShare, Admissible.Text($"releaseShare must be below {most:R}, else release would start before the {mode} curve has reached its strength"));
    }

    private static LayerResponse NotFinite() => new()
    {
        Peel = double.NaN,
        Shear = double.NaN,
        PeelByOpening = double.NaN,
        PeelBySliding = double.NaN,
        ShearByOpening = double.NaN,
        ShearBySliding = double.NaN,
        Stored = double.NaN,
        Dissipated = double.NaN,
        DissipatedByOpening = double.NaN,
        DissipatedBySliding = double.NaN,
        Damage = double.NaN,
        EnergyPeel = double.NaN,
        EnergyShear = double.NaN,
    };
}
