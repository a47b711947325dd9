namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// One damage variable for both modes, bilinear at each mix; how toughness and onset run between the modes is the mixing rule's.
/// Mode mix from the separations with the stiffnesses: B = K_II·v²/(K_I·⟨w⟩² + K_II·v²), which is G_II/(G_I + G_II) of proportional opening, because both
/// tractions carry the same factor 1 - d. The stiffnesses may differ.
/// </summary>
/// <remarks>
/// With e = sqrt(K_I·⟨w⟩² + K_II·v²): onset e0(B) = sqrt(2·Y0), end ef(B) = 2·G_c/e0. As a mixed separation δ² = ⟨w⟩² + v² with the mixed stiffness K_B = e²/δ² these are
/// e0/√K_B and ef/√K_B.
/// d = ef·(e - e0)/(e·(ef - e0)), the largest so far; tractions (1 - d)·K_i·x_i. Under proportional opening the area is ½·e0·ef = G_c(B), exactly.
/// Dissipation ∫½·e²·dd ≥ 0: exact for a constant mix; with a changing mix summed over eight parts of the straight stride with the mean of the closed forms of both ends of
/// a part, second order in the stride. Damage at the end of a stride is that of its end; with exponents below 1 the surfaces of equal damage are not convex and the straight way
/// may pass a little above (1e-3 of a toughness at 0.6, gone with short strides).
/// The elastic energy ½·(1 - d)·e² is a function of state and d never falls, so no path from and back to zero separation gains energy; the energy spent up to
/// separation under a changing mix may however lie a little outside Γ_I to Γ_II, when onset over end differs between the modes.
/// Pressed together: contact stiffness, mix 1, sliding keeps its damage. The damage handed out is the share of G_c spent at the mix of growth,
/// r·d/(1 - d·(1 - r)) with r = e0/ef, the largest so far.
/// </remarks>
public abstract class OneDamageLaw : ILayerLaw
{
    private const int DamageVariable = 0, SpentPeel = 1, SpentShear = 2, ShareSpent = 3, Opening = 4, Sliding = 5;

    private const int Parts = 8;

    private readonly double _contact;
    private readonly double _peelRoot;
    private readonly double _shearRoot;

    /// <summary>Law from two bilinear curves.</summary>
    /// <param name="peel">Curve of pure peel.</param>
    /// <param name="shear">Curve of pure shear.</param>
    /// <param name="contactStiffness">Stiffness when pressed together [MPa/mm], > 0.</param>
    /// <exception cref="ArgumentNullException">A curve is missing.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    private protected OneDamageLaw(BilinearCurve peel, BilinearCurve shear, double contactStiffness)
    {
        ArgumentNullException.ThrowIfNull(peel);
        ArgumentNullException.ThrowIfNull(shear);
        _contact = Admissible.Positive(contactStiffness, nameof(contactStiffness));
        _peelRoot = Math.Sqrt(peel.Stiffness);
        _shearRoot = Math.Sqrt(shear.Stiffness);
        PeelOnset = 0.5 * peel.Strength * peel.ElasticLimit;
        ShearOnset = 0.5 * shear.Strength * shear.ElasticLimit;
        Stiffness = new LayerStiffness(peel.Stiffness, shear.Stiffness, contactStiffness);
        PeelToughness = peel.Toughness;
        ShearToughness = shear.Toughness;
        FinalOpening = peel.FinalSeparation;
        FinalSliding = shear.FinalSeparation;
    }

    /// <inheritdoc/>
    public int StateSize => 6;

    /// <inheritdoc/>
    public abstract bool HasSymmetricTangent { get; }

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

    /// <summary>Y_I = S_I²/(2·K_I) [N/mm].</summary>
    private protected double PeelOnset { get; }

    /// <summary>Y_II = S_II²/(2·K_II) [N/mm].</summary>
    private protected double ShearOnset { get; }

    /// <summary>Toughness at a mix B = G_II/(G_I + G_II) from 0 to 1 [N/mm].</summary>
    public double Toughness(double mix) => At(Math.Sqrt(1 - mix), Math.Sqrt(mix)).Toughness;

    /// <summary>The bilinear law at a mix.</summary>
    /// <param name="along">√(1 - B), 0 to 1.</param>
    /// <param name="across">√B with the sign of the sliding, -1 to 1.</param>
    private protected abstract MixPoint At(double along, double across);

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
                double byLast = 0.5 * lastProgress * last.Mix.SpentByTurn(reached, damage), byNode = 0.5 * progress * node.Mix.SpentByTurn(reached, damage);
                answer.DissipatedByOpening += gain * byOpening - loss * reachedByOpening + byLast * last.TurnByOpening + byNode * node.TurnByOpening;
                answer.DissipatedBySliding += gain * bySliding - loss * reachedBySliding + byLast * last.TurnBySliding + byNode * node.TurnBySliding;
                (reached, reachedByOpening, reachedBySliding) = (damage, byOpening, bySliding);
            }
            (last, lastProgress) = (node, progress);
        }
    }

    /// <summary>A separation seen by the law: norm, mix, the damage it asks for and the gradients of damage and of the mixing rule's variable.</summary>
    private readonly record struct Node(double Norm, MixPoint Mix, double Damage, double DamageByOpening, double DamageBySliding, double TurnByOpening, double TurnBySliding);

    private Node NodeAt(in Separation z)
    {
        double a = z.Opening < 0 ? 0 : _peelRoot * z.Opening, b = _shearRoot * z.Sliding, e = double.Hypot(a, b);
        if (e == 0)
            return new Node(0, At(1, 0), 0, 0, 0, 0, 0);
        double along = a / e, across = b / e;
        MixPoint mix = At(along, across);
        double damage = mix.Damage(e);
        double turnByOpening = mix.TurnByPeel / e * _peelRoot;
        double turnBySliding = mix.TurnByShear / e * _shearRoot;
        if (damage is not (> 0 and < 1))
            return new Node(e, mix, damage, 0, 0, turnByOpening, turnBySliding);
        double byNorm = mix.DamageByNorm(e), byTurn = mix.DamageByTurn(e);
        return new Node(e, mix, damage, byNorm * along * _peelRoot + byTurn * turnByOpening, byNorm * across * _shearRoot + byTurn * turnBySliding, turnByOpening, turnBySliding);
    }
}
