namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Coulomb friction between faces that are no longer bonded, added to the law of the layer: pressed together with p = -peel they stick with the stiffness k, τ = k·(v - vs), as long as |τ| ≤ μ·p, and
/// slip at ±μ·p beyond, with vs following. Friction acts once a place is separated for good, from where it then stands; before that the law alone speaks. Faces apart lose their vs.
/// Closest-point return, exact for given accepted state (Simo and Laursen 1992 for the return; from memory). Spent: ½·μ·(p at the start of slip in the stride + p at its end)·|slip|, exact
/// where pressure and sliding go in proportion over the stride; faces that part lose the little that sticking stored. The tangent is skew while slipping: dτ/dw = ±μ·dp/dw, dp/dv = 0.
/// </summary>
/// <remarks>State: that of the inner law, then vs [mm], v - vs [mm], pressure [MPa], energy spent [N/mm], and 1 once friction acts.</remarks>
public sealed class FrictionLaw : WrappedLaw
{
    private const int OwnState = 5;

    private readonly double _coefficient, _stiffness;
    private readonly bool _neverBonded;

    /// <summary>Adds friction to a law.</summary>
    /// <param name="inner">Law of the layer; its answer on <see cref="LawBranch.Separated"/> must have no shear.</param>
    /// <param name="coefficient">Coefficient of friction μ, > 0.</param>
    /// <param name="neverBonded">Whether friction acts from the start.</param>
    /// <exception cref="ArgumentOutOfRangeException">The coefficient or the contact stiffness is not above 0.</exception>
    public FrictionLaw(ILayerLaw inner, double coefficient, bool neverBonded)
        : base(inner)
    {
        _coefficient = Admissible.Positive(coefficient, nameof(coefficient));
        _stiffness = Admissible.Positive(inner.Stiffness.Contact, nameof(inner));
        _neverBonded = neverBonded;
    }

    /// <inheritdoc/>
    public override int StateSize => Inner.StateSize + OwnState;

    /// <inheritdoc/>
    public override bool HasSymmetricTangent => false;

    /// <inheritdoc/>
    public override LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        int n = Inner.StateSize;
        LayerResponse answer = Inner.Update(separation, at, accepted[..n], tentative[..n]);
        double origin = accepted[n], spent = accepted[n + 3];
        bool acts = _neverBonded || accepted[n + 4] != 0, separated = answer.Branch == LawBranch.Separated;
        double pressure = separated ? Math.Max(-answer.Peel, 0) : 0, sliding = separation.Sliding;
        if (!acts || !separated || pressure == 0)
        {
            spent += 0.5 * _stiffness * accepted[n + 1] * accepted[n + 1];
            origin = sliding;
        }
        else
        {
            double limit = _coefficient * pressure, trial = _stiffness * (sliding - origin);
            if (Math.Abs(trial) <= limit)
            {
                answer.Shear += trial;
                answer.ShearBySliding += _stiffness;
                answer.Stored += 0.5 * trial * (sliding - origin);
            }
            else
            {
                double sense = Math.Sign(trial), slip = (Math.Abs(trial) - limit) / _stiffness;
                answer.Shear += sense * limit;
                answer.ShearByOpening -= sense * _coefficient * answer.PeelByOpening;
                answer.Stored += 0.5 * limit * limit / _stiffness;
                spent += 0.5 * (LimitAtStart(sense, accepted[(n + 1)..], limit, Math.Abs(trial) - limit) + limit) * slip;
                origin = sliding - sense * limit / _stiffness;
            }
        }
        tentative[n] = origin;
        tentative[n + 1] = sliding - origin;
        tentative[n + 2] = pressure;
        tentative[n + 3] = spent;
        tentative[n + 4] = separated ? 1 : 0;
        answer.SpentInFriction = spent;
        return answer;
    }

    /// <summary>μ·p where slip sets in on the straight way from the accepted point: there the traction of sticking meets it.</summary>
    /// <param name="sense">Sense of the slip.</param>
    /// <param name="accepted">v - vs and pressure at the accepted point.</param>
    /// <param name="limit">μ·p at the end of the stride.</param>
    /// <param name="beyond">How far sticking would exceed it there.</param>
    private double LimitAtStart(double sense, ReadOnlySpan<double> accepted, double limit, double beyond)
    {
        double before = _coefficient * accepted[1], room = Math.Max(before - sense * _stiffness * accepted[0], 0);
        return before + room / (room + beyond) * (limit - before);
    }
}
