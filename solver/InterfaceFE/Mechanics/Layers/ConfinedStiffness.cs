namespace InterfaceFE.Mechanics.Layers;

/// <summary>What holds a thin layer along itself.</summary>
public enum LayerRestraint
{
    /// <summary>Held by stiff faces along and across: the in-plane strains are the faces'.</summary>
    Confined,

    /// <summary>Free along, held out of plane.</summary>
    UnconfinedHeld,

    /// <summary>Free along and out of plane.</summary>
    UnconfinedFree,
}

/// <summary>
/// Elastic stiffness and stress-free opening of a layer from the properties of its material, by Hooke's law with σ_along, σ_across or the strains set to what holds it.
/// Peel: confined E(1-ν)/((1+ν)(1-2ν))/t, free along and held across E/(1-ν²)/t, free both ways E/t. Shear: E/(2(1+ν))/t.
/// </summary>
public sealed class ConfinedStiffness
{
    private readonly double _poisson;
    private readonly double _expansion;
    private readonly double _thickness;

    /// <summary>Layer of one material.</summary>
    /// <param name="young">E [MPa], > 0.</param>
    /// <param name="poisson">ν, above -1, below 0.5.</param>
    /// <param name="expansion">Linear thermal expansion α [1/K].</param>
    /// <param name="thickness">t [mm], > 0.</param>
    /// <param name="restraint">What holds the layer along itself.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is outside its range.</exception>
    public ConfinedStiffness(double young, double poisson, double expansion, double thickness, LayerRestraint restraint)
    {
        Admissible.Positive(young, nameof(young));
        if (!(poisson is > -1 and < 0.5))
            throw new ArgumentOutOfRangeException(nameof(poisson), poisson, "poisson must lie above -1 and below 0.5");
        if (!double.IsFinite(expansion))
            throw new ArgumentOutOfRangeException(nameof(expansion), expansion, "expansion must be finite");
        if (!Enum.IsDefined(restraint))
            throw new ArgumentOutOfRangeException(nameof(restraint), restraint, "restraint must be one of the named ones");
        _thickness = Admissible.Positive(thickness, nameof(thickness));
        _poisson = poisson;
        _expansion = expansion;
        Restraint = restraint;
        Shear = young / (2 * (1 + poisson)) / thickness;
        Peel = young / thickness * restraint switch
        {
            LayerRestraint.Confined => (1 - poisson) / ((1 + poisson) * (1 - 2 * poisson)),
            LayerRestraint.UnconfinedHeld => 1 / ((1 - poisson) * (1 + poisson)),
            _ => 1,
        };
    }

    /// <summary>What holds the layer along itself.</summary>
    public LayerRestraint Restraint { get; }

    /// <summary>Peel stiffness [MPa/mm].</summary>
    public double Peel { get; }

    /// <summary>Shear stiffness [MPa/mm].</summary>
    public double Shear { get; }

    /// <summary>Whether the peel stiffness hangs on the last digits of Poisson's ratio: confined and ν above 0.45 (peel modulus over E is 3.8 at 0.45, 17 at 0.49).</summary>
    public bool IsSensitive => Restraint == LayerRestraint.Confined && _poisson > 0.45;

    /// <summary>
    /// Opening at which the peel traction is 0 after a change of temperature [mm]. Confined: t·[α·ΔT·(1+ν)/(1-ν) - ν/(1-ν)·(ex + ez)];
    /// free along, held across: t·[(1+ν)·α·ΔT - ν·ez]; free both ways: t·α·ΔT.
    /// </summary>
    /// <param name="temperatureChange">ΔT from the stress-free temperature [K].</param>
    /// <param name="along">ex: free thermal strain of the adherends along the layer, mean of both faces (held isotropic: (1+ν_a)·α_a·ΔT, free: α_a·ΔT).</param>
    /// <param name="across">ez: free thermal strain of the adherends out of plane, mean of both faces (held: 0, free: α_a·ΔT, uniform: the group's).</param>
    public double FreeOpening(double temperatureChange, double along, double across)
    {
        double free = _expansion * temperatureChange;
        return _thickness * Restraint switch
        {
            LayerRestraint.Confined => (free * (1 + _poisson) - _poisson * (along + across)) / (1 - _poisson),
            LayerRestraint.UnconfinedHeld => free * (1 + _poisson) - _poisson * across,
            _ => free,
        };
    }
}
