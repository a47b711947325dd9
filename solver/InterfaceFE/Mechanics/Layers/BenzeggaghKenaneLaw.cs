namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// One damage variable for both modes, bilinear, toughness by Benzeggagh and Kenane 1996: G_c(B) = Γ_I + (Γ_II - Γ_I)·B^η.
/// Mode mix from the separations with the stiffnesses: B = K_II·v²/(K_I·⟨w⟩² + K_II·v²), which is G_II/(G_I + G_II) of proportional opening, because both
/// tractions carry the same factor 1 - d. The stiffnesses may differ.
/// </summary>
/// <remarks>
/// With e = sqrt(K_I·⟨w⟩² + K_II·v²): onset e0(B) = sqrt(2·Y0), Y0(B) = Y_I + (Y_II - Y_I)·B^η, Y_i = S_i²/(2·K_i) (form of Turon et al. 2010, from memory);
/// end ef(B) = 2·G_c/e0. As a mixed separation δ² = ⟨w⟩² + v² with the mixed stiffness K_B = e²/δ² these are e0/√K_B and ef/√K_B.
/// d = ef·(e - e0)/(e·(ef - e0)), the largest so far; tractions (1 - d)·K_i·x_i. Under proportional opening the area is ½·e0·ef = G_c(B), exactly.
/// Dissipation ∫½·e²·dd ≥ 0: exact for a constant mix; with a changing mix summed over eight parts of the straight stride with the mean of the closed forms of both ends of
/// a part, second order in the stride. Damage at the end of a stride is that of its end; with exponents below 1 the surfaces of equal damage are not convex and the straight way
/// may pass a little above (1e-3 of a toughness at 0.6, gone with short strides).
/// The elastic energy ½·(1 - d)·e² is a function of state and d never falls, so no path from and back to zero separation gains energy; the energy spent up to
/// separation under a changing mix may however lie a little outside Γ_I to Γ_II, when onset over end differs between the modes.
/// Pressed together: contact stiffness, mix 1, sliding keeps its damage. The damage handed out is the share of G_c spent at the mix of growth,
/// r·d/(1 - d·(1 - r)) with r = e0/ef, the largest so far. Exponents below ½ have an infinite slope at pure peel.
/// </remarks>
public sealed class BenzeggaghKenaneLaw : ILayerLaw
{
    private const int DamageVariable = 0, SpentPeel = 1, SpentShear = 2, ShareSpent = 3, Opening = 4, Sliding = 5;

    private const int Parts = 8;

    private readonly double _exponent;
    private readonly double _contact;
    private readonly double _peelRoot;
    private readonly double _shearRoot;
    private readonly double _peelOnset;
    private readonly double _shearOnset;

    /// <summary>Law from two bilinear curves and an exponent.</summary>
    /// <param name="peel">Curve of pure peel.</param>
    /// <param name="shear">Curve of pure shear.</param>
    /// <param name="exponent">η, from 0.1 to 20.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <exception cref="ArgumentNullException">A curve is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public BenzeggaghKenaneLaw(BilinearCurve peel, BilinearCurve shear, double exponent, double contactStiffness)
    {
        ArgumentNullException.ThrowIfNull(peel);
        ArgumentNullException.ThrowIfNull(shear);
        _exponent = Admissible.Within(exponent, 0.1, 20, nameof(exponent));
        _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));
        _peelRoot = Math.Sqrt(peel.Stiffness);
        _shearRoot = Math.Sqrt(shear.Stiffness);
        _peelOnset = 0.5 * peel.Strength * peel.ElasticLimit;
        _shearOnset = 0.5 * shear.Strength * shear.ElasticLimit;
        Stiffness = new LayerStiffness(peel.Stiffness, shear.Stiffness, contactStiffness);
        PeelToughness = peel.Toughness;
        ShearToughness = shear.Toughness;
        FinalOpening = peel.FinalSeparation;
        FinalSliding = shear.FinalSeparation;
    }

    /// <inheritdoc/>
    public int StateSize => 6;

    /// <inheritdoc/>
    public bool HasSymmetricTangent => PeelToughness == ShearToughness && _peelOnset == _shearOnset;

    /// <inheritdoc/>
    public LayerStiffness Stiffness { get; }

    /// <inheritdoc/>
    public double PeelToughness { get; }

    /// <inheritdoc/>
    public double ShearToughness { get; }

    /// <inheritdoc/>
    public double FinalOpening { get; }

    /// <inheritdoc/>
    public double FinalSliding { get; }

    /// <summary>Toughness at a mix B = G_II/(G_I + G_II) from 0 to 1 [N/mm].</summary>
    public double Toughness(double mix) => PeelToughness + (ShearToughness - PeelToughness) * Math.Pow(mix, _exponent);

    /// <inheritdoc/>
    public LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
    {
        accepted[..StateSize].CopyTo(tentative);
        tentative[Opening] = separation.Opening;
        tentative[Sliding] = separation.Sliding;
        double before = accepted[DamageVariable];
        Node end = NodeAt(separation);
        bool open = !(separation.Opening < 0);
        bool growing = end.Damage > before || (end.Damage == before && before is > 0 and < 1);
        double integrity = growing ? end.Mix.Integrity(end.Norm) : 1 - before;
        double peel = Stiffness.Peel * separation.Opening, shear = Stiffness.Shear * separation.Sliding;
        LayerResponse answer = new()
        {
            PeelByOpening = open ? integrity * Stiffness.Peel : _contact,
            ShearBySliding = integrity * Stiffness.Shear,
            Peel = open ? integrity * peel : _contact * separation.Opening,
            Shear = integrity * shear,
            Branch = before >= 1 ? LawBranch.Separated : before > 0 ? LawBranch.Unloading : LawBranch.Elastic,
        };
        if (growing)
        {
            bool apart = end.Damage >= 1;
            answer.Branch = apart ? LawBranch.Separated : LawBranch.Growing;
            if (!apart)
            {
                answer.PeelByOpening -= open ? peel * end.DamageByOpening : 0;
                answer.PeelBySliding = open ? -peel * end.DamageBySliding : 0;
                answer.ShearByOpening = -shear * end.DamageByOpening;
                answer.ShearBySliding -= shear * end.DamageBySliding;
            }
            Spend(new Stride(new Separation(accepted[Opening], accepted[Sliding]), separation), end, tentative, ref answer);
            tentative[DamageVariable] = end.Damage;
            tentative[ShareSpent] = apart ? 1 : Math.Max(accepted[ShareSpent], end.Mix.Share(end.Damage));
        }
        double peelStored = open ? 0.5 * answer.Peel * separation.Opening : 0, shearStored = 0.5 * answer.Shear * separation.Sliding;
        answer.Stored = shearStored + 0.5 * answer.Peel * separation.Opening;
        answer.Dissipated = tentative[SpentPeel] + tentative[SpentShear];
        answer.EnergyPeel = tentative[SpentPeel] + peelStored;
        answer.EnergyShear = tentative[SpentShear] + shearStored;
        answer.Damage = tentative[ShareSpent];
        return answer;
    }

    /// <summary>
    /// Adds what the stride dissipates, and its gradient by the end. A part that raises damage from d0 to d1 spends the mean, over the mixes of both its ends, of the closed
    /// form at constant mix; nodes move with the end in proportion to their progress.
    /// </summary>
    private void Spend(in Stride stride, in Node end, Span<double> state, ref LayerResponse answer)
    {
        double reached = state[DamageVariable], reachedByOpening = 0, reachedBySliding = 0;
        Node last = NodeAt(stride.From);
        double lastProgress = last.Norm > 0 ? 0 : 1.0 / Parts;
        if (lastProgress > 0)
            last = NodeAt(stride.At(lastProgress));
        for (int k = 1; k <= Parts && reached < 1; k++)
        {
            double progress = (double)k / Parts;
            Node node = k == Parts ? end : NodeAt(stride.At(progress));
            bool capped = node.Damage >= end.Damage;
            double damage = capped ? end.Damage : node.Damage;
            if (damage >= reached && damage > 0)
            {
                double scale = capped ? 1 : progress;
                double byOpening = scale * (capped ? end.DamageByOpening : node.DamageByOpening), bySliding = scale * (capped ? end.DamageBySliding : node.DamageBySliding);
                double first = 0.5 * last.Mix.Spent(reached, damage), second = 0.5 * node.Mix.Spent(reached, damage);
                state[SpentPeel] += (1 - last.Mix.Mix) * first + (1 - node.Mix.Mix) * second;
                state[SpentShear] += last.Mix.Mix * first + node.Mix.Mix * second;
                double gain = 0.5 * (last.Mix.Release(damage) + node.Mix.Release(damage)), loss = 0.5 * (last.Mix.Release(reached) + node.Mix.Release(reached));
                double byLast = 0.5 * lastProgress * last.Mix.SpentByPower(reached, damage), byNode = 0.5 * progress * node.Mix.SpentByPower(reached, damage);
                answer.DissipatedByOpening += gain * byOpening - loss * reachedByOpening + byLast * last.PowerByOpening + byNode * node.PowerByOpening;
                answer.DissipatedBySliding += gain * bySliding - loss * reachedBySliding + byLast * last.PowerBySliding + byNode * node.PowerBySliding;
                (reached, reachedByOpening, reachedBySliding) = (damage, byOpening, bySliding);
            }
            (last, lastProgress) = (node, progress);
        }
    }

    /// <summary>A separation seen by the law: norm, mix, the damage it asks for and the gradients of damage and B^η.</summary>
    private readonly record struct Node(double Norm, MixPoint Mix, double Damage, double DamageByOpening, double DamageBySliding, double PowerByOpening, double PowerBySliding);

    private Node NodeAt(in Separation z)
    {
        double a = z.Opening < 0 ? 0 : _peelRoot * z.Opening, b = _shearRoot * z.Sliding, e = double.Hypot(a, b);
        if (e == 0)
            return new Node(0, At(0), 0, 0, 0, 0, 0);
        double along = a / e, across = b / e;
        MixPoint mix = At(across * across);
        double damage = mix.Damage(e);
        double powerByOpening = -2 * _exponent * mix.Power * along / e * _peelRoot;
        double powerBySliding = mix.Mix > 0 ? 2 * _exponent * mix.Power / mix.Mix * (1 - mix.Mix) * across / e * _shearRoot : 0;
        if (damage is not (> 0 and < 1))
            return new Node(e, mix, damage, 0, 0, powerByOpening, powerBySliding);
        double byNorm = mix.DamageByNorm(e), byPower = mix.DamageByPower(e);
        return new Node(e, mix, damage, byNorm * along * _peelRoot + byPower * powerByOpening, byNorm * across * _shearRoot + byPower * powerBySliding, powerByOpening, powerBySliding);
    }

    private MixPoint At(double mix)
    {
        double power = Math.Pow(mix, _exponent);
        return new MixPoint(mix, power, _peelOnset + (_shearOnset - _peelOnset) * power, PeelToughness + (ShearToughness - PeelToughness) * power, _shearOnset - _peelOnset, ShearToughness - PeelToughness);
    }

    /// <summary>The bilinear law at one mix in the energy norm e.</summary>
    /// <param name="Mix">B.</param>
    /// <param name="Power">B^η.</param>
    /// <param name="OnsetEnergy">Y0 [N/mm].</param>
    /// <param name="Toughness">G_c [N/mm].</param>
    /// <param name="OnsetByPower">dY0/d(B^η).</param>
    /// <param name="ToughnessByPower">dG_c/d(B^η).</param>
    private readonly record struct MixPoint(double Mix, double Power, double OnsetEnergy, double Toughness, double OnsetByPower, double ToughnessByPower)
    {
        private double Onset => Math.Sqrt(2 * OnsetEnergy);

        private double End => 2 * Toughness / Onset;

        /// <summary>r = e0/ef.</summary>
        private double Ratio => OnsetEnergy / Toughness;

        public double Damage(double e) => e <= Onset ? 0 : e >= End ? 1 : e > 0 ? End * (e - Onset) / (e * (End - Onset)) : double.NaN;

        /// <summary>1 - d without cancellation.</summary>
        public double Integrity(double e) => e >= End ? 0 : Onset * (End - e) / (e * (End - Onset));

        public double DamageByNorm(double e) => End * Onset / (e * e * (End - Onset));

        /// <summary>∂d/∂(B^η) through onset and end.</summary>
        public double DamageByPower(double e)
        {
            double onset = Onset, end = End, span = end - onset, damage = Damage(e);
            double onsetByPower = OnsetByPower / onset, endByPower = 2 * ToughnessByPower / onset - end * onsetByPower / onset;
            return (damage - end / e) / span * onsetByPower - damage * onset / (end * span) * endByPower;
        }

        /// <summary>Share of G_c spent at a damage.</summary>
        public double Share(double damage) => damage >= 1 ? 1 : Ratio * damage / (1 - damage * (1 - Ratio));

        /// <summary>Energy spent from one damage to another at this mix [N/mm].</summary>
        public double Spent(double from, double to) => Toughness * Math.Max(0, Share(to) - Share(from));

        /// <summary>d spent/d damage = ½·e² on the growing branch [N/mm].</summary>
        public double Release(double damage)
        {
            double left = 1 - damage * (1 - Ratio);
            return OnsetEnergy / (left * left);
        }

        /// <summary>∂ spent/∂(B^η).</summary>
        public double SpentByPower(double from, double to)
        {
            double ratioByPower = (OnsetByPower - Ratio * ToughnessByPower) / Toughness;
            return ToughnessByPower * Math.Max(0, Share(to) - Share(from)) + Toughness * ratioByPower * (ShareByRatio(to) - ShareByRatio(from));
        }

        private double ShareByRatio(double damage)
        {
            double left = 1 - damage * (1 - Ratio);
            return damage * (1 - damage) / (left * left);
        }
    }
}
