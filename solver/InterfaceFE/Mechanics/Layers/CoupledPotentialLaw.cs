namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Coupled potential of Park, Paulino and Roesler 2009 (from memory). With the modes' energies left a = Γ_I·g_I - ⟨Γ_I - Γ_II⟩ and b = Γ_II·g_II - ⟨Γ_II - Γ_I⟩ the potential is
/// Γ_min - a·b/Γ_min: while both separations grow, T_I = -a'·⟨b⟩/Γ_min and T_II = -b'·⟨a⟩/Γ_min. The mode of smaller toughness ends the other one only at its own end; the tougher mode ends the
/// other one where its a or b passes 0, before its own end, and goes on alone. Separated where either mode reaches its final separation.
/// </summary>
/// <remarks>
/// Unloading with both secants frozen at the joint maxima M = largest opening, N = largest amount of sliding: peel = T_I(M, N)·w/M, shear = T_II(M, N)·v/N (a stated deviation: unloading each mode by
/// itself lets closed paths gain energy). Both secants fall with M and with N, so dissipation -½w²·dk_I - ½v²·dk_II never falls and no path from and back to zero gains energy.
/// Dissipation along a straight stride is exact where the potential gives it (one mode growing, or both while a and b are above 0); what one mode loses by the growth of the other while it does not
/// grow itself is summed with eight Gauss points between kinks. Pressed together: contact stiffness, no energy counted, sliding goes on.
/// The damage handed out counts from the strength on: 1 - (1 - d_I)(1 - d_II), d_i the energy of the mode alone spent for good. Tangent symmetric while both modes grow and a, b > 0.
/// </remarks>
public sealed class CoupledPotentialLaw : ILayerLaw
{
    private const int Opening = 0, Sliding = 1, LargestOpening = 2, LargestSliding = 3, LossPeel = 4, LossShear = 5;

    private readonly PotentialMode _peel;
    private readonly PotentialMode _shear;
    private readonly double _contact;
    private readonly PotentialPath _path;

    /// <summary>Law from two modes.</summary>
    /// <param name="peel">Peel.</param>
    /// <param name="shear">Shear, the same in both senses.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <exception cref="ArgumentNullException">A mode is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">The stiffness is not above 0.</exception>
    public CoupledPotentialLaw(PotentialMode peel, PotentialMode shear, double contactStiffness)
    {
        ArgumentNullException.ThrowIfNull(peel);
        ArgumentNullException.ThrowIfNull(shear);
        _peel = peel;
        _shear = shear;
        _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));
        _path = new PotentialPath(peel, shear);
    }

    /// <inheritdoc/>
    public int StateSize => 6;

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

    /// <inheritdoc/>
    public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        accepted[..StateSize].CopyTo(tentative);
        if (!double.IsFinite(separation.Opening) || !double.IsFinite(separation.Sliding))
            return Spread(double.NaN);
        tentative[Opening] = separation.Opening;
        tentative[Sliding] = separation.Sliding;
        double before = accepted[LargestOpening], beforeSliding = accepted[LargestSliding];
        bool open = !(separation.Opening < 0);
        double w = open ? separation.Opening : 0, v = separation.Sliding, amount = Math.Abs(v);
        LayerResponse answer = new()
        {
            Peel = open ? 0 : _contact * separation.Opening,
            PeelByOpening = open ? 0 : _contact,
            Stored = open ? 0 : 0.5 * _contact * separation.Opening * separation.Opening,
            Branch = LawBranch.Separated,
        };
        bool wasApart = before >= FinalOpening || beforeSliding >= FinalSliding;
        double largest = Math.Max(before, w), largestSliding = Math.Max(beforeSliding, amount);
        tentative[LargestOpening] = largest;
        tentative[LargestSliding] = largestSliding;
        Stride stride = new(new Separation(accepted[Opening], accepted[Sliding]), separation);
        bool grows = !wasApart && (largest > before || largestSliding > beforeSliding || (open && w >= before) || amount >= beforeSliding);
        PathLoss loss = grows ? _path.Along(stride, before, beforeSliding) : default;
        tentative[LossPeel] += loss.Peel;
        tentative[LossShear] += loss.Shear;
        bool apart = largest >= FinalOpening || largestSliding >= FinalSliding;
        double peelStored = 0, shearStored = 0;
        if (!apart)
        {
            PotentialSecants k = _path.At(largest, largestSliding);
            bool growsOpening = open && w >= before, growsSliding = amount >= beforeSliding;
            double sense = v < 0 ? -1 : 1;
            double peel = k.Peel * w, peelByOpening = open ? k.Peel + (growsOpening ? w * k.PeelByOpening : 0) : 0, peelBySliding = growsSliding ? sense * w * k.PeelBySliding : 0;
            double shearByOpening = growsOpening ? v * k.ShearByOpening : 0;
            answer.Shear = k.Shear * v;
            answer.ShearByOpening = shearByOpening;
            answer.ShearBySliding = k.Shear + (growsSliding ? amount * k.ShearBySliding : 0);
            answer.PeelBySliding = peelBySliding;
            answer.Branch = (growsOpening && w > 0) || (growsSliding && amount > 0) ? LawBranch.Growing : largest > 0 || largestSliding > 0 ? LawBranch.Unloading : LawBranch.Elastic;
            peelStored = 0.5 * peel * w;
            shearStored = 0.5 * answer.Shear * v;
            if (grows)
            {
                answer.DissipatedByOpening = open ? 0.5 * (peel - w * peelByOpening - v * shearByOpening) : 0;
                answer.DissipatedBySliding = 0.5 * (answer.Shear - w * peelBySliding - v * answer.ShearBySliding);
            }
            answer.Peel += peel;
            answer.PeelByOpening += peelByOpening;
        }
        // Dissipated = work - change of stored; the work's gradient is the traction plus what the skew tangent leaves along the way.
        answer.DissipatedByOpening -= stride.SlidingChange * loss.SkewMoment;
        answer.DissipatedBySliding += stride.OpeningChange * loss.SkewMoment;
        answer.Stored += peelStored + shearStored;
        answer.Dissipated = tentative[LossPeel] + tentative[LossShear];
        answer.EnergyPeel = tentative[LossPeel] + peelStored;
        answer.EnergyShear = tentative[LossShear] + shearStored;
        double damage = 1 - (1 - _peel.Damage(largest / FinalOpening)) * (1 - _shear.Damage(largestSliding / FinalSliding));
        answer.Damage = apart ? 1 : Math.Min(damage, double.BitDecrement(1));
        return answer;
    }

    private static LayerResponse Spread(double value) => new()
    {
        Peel = value,
        Shear = value,
        PeelByOpening = value,
        PeelBySliding = value,
        ShearByOpening = value,
        ShearBySliding = value,
        Stored = value,
        Dissipated = value,
        DissipatedByOpening = value,
        DissipatedBySliding = value,
        Damage = value,
        EnergyPeel = value,
        EnergyShear = value,
    };
}
