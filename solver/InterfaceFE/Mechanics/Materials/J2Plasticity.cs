namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// Isotropic elasticity that yields by von Mises, with isotropic hardening by a table and linear kinematic hardening, held or free out of plane.
/// <para>
/// With the deviator s of the stress and the back stress X = (2/3)·H·(plastic strain) (Prager 1956), yield where q = sqrt(3/2·(s - X):(s - X)) reaches the yield stress
/// sigma(kappa, T). The plastic strain grows along s - X and keeps the volume; kappa grows by sqrt(2/3·d:d) of its growth d. In uniaxial tension stress = sigma(kappa) + H·kappa.
/// </para>
/// <para>
/// Integrated backward (Euler) from the accepted state: <see cref="RadialReturn"/> for held, <see cref="PlaneStressReturn"/> for free, both to the last digits, with the consistent
/// tangent. Stored is the elastic energy and H/3·(plastic strain):(plastic strain), which the moved surface keeps; dissipated is the integral of sigma d(kappa), which never falls.
/// A point that does not yield in the stride answers with the elastic tangent, the same to the last bit. State: plastic strain xx, yy, xy (engineering), kappa, dissipated energy
/// per volume [MPa], and, where yield depends on temperature, the temperature change.
/// </para>
/// </summary>
public sealed class J2Plasticity : IPlaneLaw
{
    /// <summary>Place of the equivalent plastic strain in the state of a point.</summary>
    public const int EquivalentStrain = 3;

    /// <summary>Units of rounding of the largest stress involved by which a trial stress must exceed yield.</summary>
    private const double Rounding = 16.0 / (1L << 52);

    private const int Dissipated = 4;
    private const int Temperature = 5;

    private readonly PlaneElasticity _elastic;
    private readonly double[] _expansion;
    private readonly double _bulk, _shear, _moving, _stressFreeTemperature;

    /// <summary>Makes the law.</summary>
    /// <param name="constants">Elastic constants in the law's axes; must be those of an isotropic material but for the expansion.</param>
    /// <param name="curve">Yield stress by plastic strain and temperature.</param>
    /// <param name="kinematicHardening">Slope H by which the yield surface moves [MPa], at least 0.</param>
    /// <param name="state">State out of plane.</param>
    /// <param name="stressFreeTemperature">Temperature without thermal stress [K].</param>
    /// <exception cref="ArgumentException">The constants are no stable isotropic elastic material; the message says why.</exception>
    public J2Plasticity(in OrthotropicConstants constants, YieldCurve curve, double kinematicHardening, OutOfPlaneState state, double stressFreeTemperature)
        : this(PlaneElasticity.Orthotropic(constants, state), constants, curve, kinematicHardening, stressFreeTemperature, [constants.ExpansionX, constants.ExpansionY, constants.ExpansionZ, 0])
    {
        double shear = constants.YoungX / (2 * (1 + constants.PoissonXy));
        bool isIsotropic = constants.YoungX == constants.YoungY && constants.YoungX == constants.YoungZ && constants.PoissonXy == constants.PoissonXz && constants.PoissonXy == constants.PoissonZy
            && Math.Abs(constants.ShearXy - shear) <= 1e-12 * shear;
        if (!isIsotropic)
            throw new ArgumentException("yielding by von Mises needs an isotropic elastic material", nameof(constants));
        if (!(kinematicHardening >= 0))
            throw new ArgumentException("kinematic hardening must be at least 0", nameof(kinematicHardening));
    }

    private J2Plasticity(PlaneElasticity elastic, in OrthotropicConstants constants, YieldCurve curve, double kinematicHardening, double stressFreeTemperature, double[] expansion)
    {
        _elastic = elastic;
        Constants = constants;
        Curve = curve;
        _moving = kinematicHardening;
        _stressFreeTemperature = stressFreeTemperature;
        _expansion = expansion;
        _bulk = constants.YoungX / (3 * (1 - 2 * constants.PoissonXy));
        _shear = constants.YoungX / (2 * (1 + constants.PoissonXy));
    }

    /// <summary>Elastic constants in the material's own axes.</summary>
    public OrthotropicConstants Constants { get; }

    /// <summary>Yield stress.</summary>
    public YieldCurve Curve { get; }

    /// <inheritdoc/>
    public int StateSize => Curve.DependsOnTemperature ? 6 : 5;

    /// <summary>The same material with its axes turned about z: only expansion by direction can tell.</summary>
    /// <param name="angle">Angle from the model's x axis to the material's, counter-clockwise [rad].</param>
    public J2Plasticity Rotated(double angle)
    {
        if (_expansion[0] == _expansion[1] || angle == 0)
            return this;
        (double s, double c) = Math.SinCos(angle);
        double x = _expansion[0], y = _expansion[1];
        return new J2Plasticity(_elastic.Rotated(angle), Constants, Curve, _moving, _stressFreeTemperature, [c * c * x + s * s * y, s * s * x + c * c * y, _expansion[2], 2 * c * s * (x - y)]);
    }

    /// <inheritdoc/>
    public PlaneEnergy Update(
        ReadOnlySpan<double> strain,
        double temperatureChange,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> stress,
        Span<double> tangent,
        Span<double> byTemperature = default)
    {
        (double share, double shareByTemperature) = Curve.ShareAt(_stressFreeTemperature + temperatureChange);
        accepted.CopyTo(tentative);
        Span<double> elastic = stackalloc double[4], moduli = stackalloc double[16], byYield = stackalloc double[4];
        ElasticStrain(strain, temperatureChange, accepted, elastic);
        double before = accepted[EquivalentStrain];
        double size = share * Curve.At(before).Stress;
        if (strain.Length > 3)
            size += 2 * _shear * Math.Abs(strain[3]);
        for (int i = 0; i < 3; i++)
            size += 2 * _shear * (Math.Abs(strain[i]) + Math.Abs(elastic[i]) + Math.Abs(accepted[i]));
        var point = new YieldInput(_bulk, _shear, _moving, Curve, share, before, Rounding * size);
        bool held = _elastic.State == OutOfPlaneState.Held;
        YieldOutput found = held ? RadialReturn.Stress(point, elastic, tentative, stress, moduli, byYield) : PlaneStressReturn.Stress(point, elastic, tentative, stress, moduli, byYield);
        if (Curve.DependsOnTemperature)
            tentative[Temperature] = temperatureChange;
        if (found.Growth > 0)
        {
            double shareBefore = Curve.DependsOnTemperature ? Curve.ShareAt(_stressFreeTemperature + accepted[Temperature]).Share : 1;
            tentative[EquivalentStrain] = before + found.Growth;
            tentative[Dissipated] += 0.5 * (shareBefore + share) * (Curve.Area(tentative[EquivalentStrain]) - Curve.Area(before));
            ElasticStrain(strain, temperatureChange, tentative, elastic);
            Inner(held ? 4 : 3, strain.Length, moduli, tangent);
            if (!byTemperature.IsEmpty)
                StressByTemperature(held, moduli, byYield, shareByTemperature * found.TableStress, byTemperature);
        }
        else
        {
            _elastic.Tangent(strain.Length, tangent);
            if (!byTemperature.IsEmpty)
                _elastic.StressByTemperature(byTemperature);
        }
        double byChange = -(_expansion[0] * stress[0] + _expansion[1] * stress[1] + _expansion[2] * stress[2] + _expansion[3] * stress[3]);
        return new PlaneEnergy(Stored(elastic, stress, tentative), tentative[Dissipated], byChange);
    }

    /// <summary>
    /// Elastic strain xx, yy, zz, xy (engineering) at fixed plastic strain. Free out of plane zz is not used: the stress there is 0.
    /// </summary>
    private void ElasticStrain(ReadOnlySpan<double> strain, double temperatureChange, ReadOnlySpan<double> state, Span<double> elastic)
    {
        elastic[0] = strain[0] - _expansion[0] * temperatureChange - state[0];
        elastic[1] = strain[1] - _expansion[1] * temperatureChange - state[1];
        elastic[2] = (strain.Length > 3 ? strain[3] : 0) - _expansion[2] * temperatureChange + state[0] + state[1];
        elastic[3] = strain[2] - _expansion[3] * temperatureChange - state[2];
    }

    private double Stored(ReadOnlySpan<double> elastic, ReadOnlySpan<double> stress, ReadOnlySpan<double> state)
    {
        double energy = 0.5 * (elastic[0] * stress[0] + elastic[1] * stress[1] + elastic[2] * stress[2] + elastic[3] * stress[3]);
        double out3 = state[0] + state[1];
        return energy + _moving / 3 * (state[0] * state[0] + state[1] * state[1] + out3 * out3 + 0.5 * state[2] * state[2]);
    }

    /// <summary>
    /// At fixed total strain a kelvin is an elastic strain of -expansion, so the tangent gives its stress (held with the part along z); a yield stress that changes adds its own.
    /// </summary>
    private void StressByTemperature(bool held, ReadOnlySpan<double> moduli, ReadOnlySpan<double> byYield, double yieldByTemperature, Span<double> byTemperature)
    {
        int size = held ? 4 : 3;
        for (int i = 0; i < byTemperature.Length; i++)
        {
            ReadOnlySpan<double> row = moduli.Slice(size * i, size);
            double blocked = row[0] * _expansion[0] + row[1] * _expansion[1] + row[2] * _expansion[3] + (held ? row[3] * _expansion[2] : 0);
            byTemperature[i] = byYield[i] * yieldByTemperature - blocked;
        }
    }

    private static void Inner(int size, int wanted, ReadOnlySpan<double> moduli, Span<double> tangent)
    {
        for (int i = 0; i < wanted; i++)
            for (int j = 0; j < wanted; j++)
                tangent[wanted * i + j] = moduli[size * i + j];
    }
}
