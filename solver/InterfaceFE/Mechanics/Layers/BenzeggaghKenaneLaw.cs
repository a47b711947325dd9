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
/// Dissipation ∫½·e²·dd ≥ 0: exact for a constant mix; with a changing mix the closed forms of both ends are averaged, second order in the stride.
/// Since the elastic energy ½·(1 - d)·e² is a function of state and d never falls, no path from and back to zero separation gains energy; the energy spent up to
/// separation under a changing mix may however lie a little outside Γ_I to Γ_II, when onset over end differs between the modes.
/// Pressed together: contact stiffness, mix 1, sliding keeps its damage. The damage handed out is the share of G_c spent at the mix of growth,
/// r·d/(1 - d·(1 - r)) with r = e0/ef, the largest so far. Exponents below ½ have an infinite slope at pure peel.
/// </remarks>
public sealed class BenzeggaghKenaneLaw : ILayerLaw
{
    private const int DamageVariable = 0, SpentPeel = 1, SpentShear = 2, GrowthMix = 3, ShareSpent = 4;

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
    public int StateSize => 5;

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
        double before = accepted[DamageVariable];
        bool open = !(separation.Opening < 0);
        double a = open ? _peelRoot * separation.Opening : 0, b = _shearRoot * separation.Sliding;
        double e = double.Hypot(a, b);
        MixPoint mix = At(e > 0 ? b / e * (b / e) : 0);
        double damage = mix.Damage(e);
        bool growing = damage > before || (damage == before && before is > 0 and < 1);
        double integrity = growing ? mix.Integrity(e) : 1 - before;
        LayerResponse answer = new()
        {
            PeelByOpening = open ? integrity * Stiffness.Peel : _contact,
            ShearBySliding = integrity * Stiffness.Shear,
            Peel = open ? integrity * _peelRoot * a : _contact * separation.Opening,
            Shear = integrity * _shearRoot * b,
            Branch = before >= 1 ? LawBranch.Separated : before > 0 ? LawBranch.Unloading : LawBranch.Elastic,
        };
        tentative[GrowthMix] = 0;
        if (growing)
            Grow(mix, e, a, b, damage, accepted, tentative, ref answer);
        double peelStored = open ? 0.5 * answer.Peel * separation.Opening : 0, shearStored = 0.5 * answer.Shear * separation.Sliding;
        answer.Stored = shearStored + 0.5 * answer.Peel * separation.Opening;
        answer.Dissipated = tentative[SpentPeel] + tentative[SpentShear];
        answer.EnergyPeel = tentative[SpentPeel] + peelStored;
        answer.EnergyShear = tentative[SpentShear] + shearStored;
        answer.Damage = tentative[ShareSpent];
        return answer;
    }

    private void Grow(in MixPoint mix, double e, double a, double b, double damage, ReadOnlySpan<double> accepted, Span<double> tentative, ref LayerResponse answer)
    {
        double before = accepted[DamageVariable];
        bool apart = damage >= 1;
        // Gradients by a = √K_I·w and b = √K_II·v, then by the separations.
        double byNorm = apart ? 0 : mix.DamageByNorm(e), byPower = apart ? 0 : mix.DamageByPower(e);
        double powerByA = -2 * _exponent * mix.Power * (a / e) / e;
        double powerByB = mix.Mix > 0 ? 2 * _exponent * mix.Power / mix.Mix * (1 - mix.Mix) * (b / e) / e : 0;
        double damageByOpening = _peelRoot * (byNorm * (a / e) + byPower * powerByA), damageBySliding = _shearRoot * (byNorm * (b / e) + byPower * powerByB);
        if (!apart)
        {
            answer.PeelByOpening -= _peelRoot * a * damageByOpening;
            answer.PeelBySliding = -_peelRoot * a * damageBySliding;
            answer.ShearByOpening = -_shearRoot * b * damageByOpening;
            answer.ShearBySliding -= _shearRoot * b * damageBySliding;
        }
        double spent = mix.Spent(before, damage), spentByDamage = mix.Release(damage);
        double half = 1;
        if (accepted[GrowthMix] > 0)
        {
            half = 0.5;
            MixPoint last = At(accepted[GrowthMix] - 1);
            double spentLast = 0.5 * last.Spent(before, damage);
            tentative[SpentPeel] += (1 - last.Mix) * spentLast;
            tentative[SpentShear] += last.Mix * spentLast;
            spentByDamage += last.Release(damage);
        }
        tentative[SpentPeel] += half * (1 - mix.Mix) * spent;
        tentative[SpentShear] += half * mix.Mix * spent;
        double spentByPower = half * mix.SpentByPower(before, damage);
        answer.DissipatedByOpening = half * spentByDamage * damageByOpening + spentByPower * _peelRoot * powerByA;
        answer.DissipatedBySliding = half * spentByDamage * damageBySliding + spentByPower * _shearRoot * powerByB;
        tentative[DamageVariable] = damage;
        tentative[GrowthMix] = apart ? 0 : 1 + mix.Mix;
        tentative[ShareSpent] = apart ? 1 : Math.Max(accepted[ShareSpent], mix.Share(damage));
        answer.Branch = apart ? LawBranch.Separated : LawBranch.Growing;
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
