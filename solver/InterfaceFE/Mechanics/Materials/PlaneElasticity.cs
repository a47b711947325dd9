using System.Globalization;

namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// Linear elastic law of a plane model, isotropic or orthotropic, held or free out of plane, in the model's axes. Immutable and safe to share between
/// threads. In-plane order is xx, yy, xy with engineering shear; a four-component stress is xx, yy, zz, xy. Stress in MPa, temperature change in K from the
/// stress-free state.
/// <para>
/// With the in-plane compliance S (3×3), the column s of out-of-plane stress on in-plane strain and s_zz = 1/E_z: held means 0 = s·stress + s_zz·szz +
/// alpha_z·dT. Eliminating szz leaves strain = (S - s·sᵀ/s_zz)·stress + (alpha - s·alpha_z/s_zz)·dT, so the in-plane expansion is alpha_x + nu_zx·alpha_z,
/// alpha_y + nu_zy·alpha_z (isotropic: (1 + nu)·alpha), and szz = nu_zx·sxx + nu_zy·syy - E_z·alpha_z·dT. Free means szz = 0 and S, alpha as they are.
/// Derived from the three-dimensional law; the tests invert that law in full.
/// </para>
/// </summary>
public sealed class PlaneElasticity : IPlaneLaw
{
    private readonly double[] _stiffness;
    private readonly double[] _expansion;
    private readonly double[] _outOfPlaneByStress;
    private readonly double _outOfPlaneByTemperature;
    private readonly double _blockedEnergy;
    private readonly double _youngZ;

    private PlaneElasticity(
        OutOfPlaneState state, double[] stiffness, double[] expansion, double[] outOfPlaneByStress, double outOfPlaneByTemperature, double blockedEnergy, double youngZ)
    {
        State = state;
        _stiffness = stiffness;
        _expansion = expansion;
        _outOfPlaneByStress = outOfPlaneByStress;
        _outOfPlaneByTemperature = outOfPlaneByTemperature;
        _blockedEnergy = blockedEnergy;
        _youngZ = youngZ;
        (YoungAlongX, ShearModulus) = BeamModuli(stiffness);
    }

    /// <summary>State out of plane.</summary>
    public OutOfPlaneState State { get; }

    /// <summary>0: elasticity has no memory.</summary>
    public int StateSize => 0;

    /// <summary>Plane stiffness [MPa]: 9 numbers, row-major 3×3, order xx, yy, xy, acting on engineering shear.</summary>
    public ReadOnlySpan<double> Stiffness => _stiffness;

    /// <summary>Free in-plane strain per kelvin [1/K]: xx, yy, xy (engineering shear, not 0 in turned axes), with the part that holding out of plane adds.</summary>
    public ReadOnlySpan<double> Expansion => _expansion;

    /// <summary>
    /// Modulus of a bar along x that is free across y [MPa], for beam formulas: stress over strain along x with no other in-plane stress. Held isotropic
    /// E/(1 - nu²), free E. Of these axes: for a turned material along the model's x, so ask the material before it is turned for the modulus along a sheet.
    /// </summary>
    public double YoungAlongX { get; }

    /// <summary>Shear modulus in the plane [MPa], for beam formulas: shear stress over shear strain with no other in-plane stress.</summary>
    public double ShearModulus { get; }

    /// <summary>Isotropic material.</summary>
    /// <param name="young">Young's modulus [MPa], > 0.</param>
    /// <param name="poisson">Poisson's ratio, above -1 and below 0.5.</param>
    /// <param name="expansion">Thermal expansion [1/K].</param>
    /// <param name="state">State out of plane.</param>
    /// <exception cref="ArgumentException">The constants are no stable elastic material; the message says why.</exception>
    public static PlaneElasticity Isotropic(double young, double poisson, double expansion, OutOfPlaneState state)
    {
        if (!(poisson is > -1 and < 0.5))
        {
            string given = string.Create(CultureInfo.InvariantCulture, $"Poisson's ratio of an isotropic material must be above -1 and below 0.5, given {poisson}");
            throw new ArgumentException(given + ": otherwise a strain exists whose elastic energy is not positive", nameof(poisson));
        }
        return Orthotropic(new OrthotropicConstants(young, young, young, poisson, poisson, poisson, young / (2 * (1 + poisson)), expansion, expansion, expansion), state);
    }

    /// <summary>Orthotropic material whose axes are the model's; <see cref="Rotated"/> turns them.</summary>
    /// <param name="constants">Constants in the material's axes.</param>
    /// <param name="state">State out of plane.</param>
    /// <exception cref="ArgumentException">The constants are no stable elastic material; the message says why.</exception>
    public static PlaneElasticity Orthotropic(in OrthotropicConstants constants, OutOfPlaneState state)
    {
        if (constants.Fault() is { } fault)
            throw new ArgumentException(fault, nameof(constants));
        bool held = state == OutOfPlaneState.Held;
        double zx = held ? constants.PoissonXz * constants.YoungZ / constants.YoungX : 0;
        double zy = held ? constants.PoissonZy : 0;
        double xx = 1 / constants.YoungX - zx * zx / constants.YoungZ;
        double yy = 1 / constants.YoungY - zy * zy / constants.YoungZ;
        double xy = -constants.PoissonXy / constants.YoungX - zx * zy / constants.YoungZ;
        double determinant = xx * yy - xy * xy;
        double blocked = held ? constants.YoungZ * constants.ExpansionZ : 0;
        return new PlaneElasticity(
            state,
            [yy / determinant, -xy / determinant, 0, -xy / determinant, xx / determinant, 0, 0, 0, constants.ShearXy],
            [constants.ExpansionX + zx * constants.ExpansionZ, constants.ExpansionY + zy * constants.ExpansionZ, 0],
            [zx, zy, 0],
            -blocked,
            0.5 * blocked * constants.ExpansionZ,
            held ? constants.YoungZ : 0);
    }

    /// <summary>A material from its parts in the model's axes; see <see cref="TurnedPly"/>.</summary>
    /// <param name="state">State out of plane.</param>
    /// <param name="stiffness">Plane stiffness, 3×3.</param>
    /// <param name="expansion">Free in-plane strain per kelvin.</param>
    /// <param name="outOfPlaneByStress">szz by in-plane stress.</param>
    /// <param name="outOfPlaneByTemperature">szz by temperature at no in-plane stress [MPa/K].</param>
    /// <param name="blockedEnergy">Energy per kelvin² at no in-plane stress [MPa/K²].</param>
    /// <param name="youngZ">szz by strain out of plane at no in-plane stress [MPa]; 0 when free.</param>
    internal static PlaneElasticity FromParts(
        OutOfPlaneState state, double[] stiffness, double[] expansion, double[] outOfPlaneByStress, double outOfPlaneByTemperature, double blockedEnergy, double youngZ) =>
        new(state, stiffness, expansion, outOfPlaneByStress, outOfPlaneByTemperature, blockedEnergy, youngZ);

    /// <summary>Modulus out of plane at no in-plane stress [MPa]; held, else 0.</summary>
    internal double YoungOutOfPlane => _youngZ;

    /// <summary>Free strain out of plane per kelvin [1/K]; held.</summary>
    internal double ExpansionOutOfPlane => -_outOfPlaneByTemperature / _youngZ;

    /// <summary>
    /// This held material as it answers to a strain out of plane e instead of a temperature change: the same stiffness with "expansion" -nu_z and szz = nu_z·stress + E_z·e. All that is
    /// computed for a temperature change (force, energy at no displacement) then holds for e.
    /// </summary>
    internal PlaneElasticity DrivenOutOfPlane() =>
        new(State, _stiffness, [-_outOfPlaneByStress[0], -_outOfPlaneByStress[1], -_outOfPlaneByStress[2]], _outOfPlaneByStress, _youngZ, 0.5 * _youngZ, _youngZ);

    /// <summary>
    /// The same material with its axes turned about z. With c = cos, s = sin the strain in the material's axes is T·strain, T = [c² s² cs; s² c² -cs; -2cs
    /// 2cs c²-s²], and the stiffness in the model's axes Tᵀ·D·T.
    /// </summary>
    /// <param name="angle">Angle from the model's x axis to the material's, counter-clockwise [rad].</param>
    public PlaneElasticity Rotated(double angle)
    {
        if (!double.IsFinite(angle))
            throw new ArgumentException("the angle must be a finite number", nameof(angle));
        if (angle == 0)
            return this;
        Span<double> there = stackalloc double[9], back = stackalloc double[9];
        StrainRotation(angle, there);
        StrainRotation(-angle, back);
        double[] stiffness = new double[9];
        for (int i = 0; i < 3; i++)
            for (int j = i; j < 3; j++)
            {
                double sum = 0;
                for (int k = 0; k < 3; k++)
                    for (int l = 0; l < 3; l++)
                        sum += there[3 * k + i] * _stiffness[3 * k + l] * there[3 * l + j];
                stiffness[3 * i + j] = stiffness[3 * j + i] = sum;
            }
        // The out-of-plane row multiplies stresses, so it turns as a strain does.
        return new PlaneElasticity(State, stiffness, Turned(back, _expansion), Turned(back, _outOfPlaneByStress), _outOfPlaneByTemperature, _blockedEnergy, _youngZ);
    }

    /// <summary>Stress at a strain. Never throws; non-finite input gives a non-finite result.</summary>
    /// <param name="strain">Total in-plane strain: xx, yy, xy (engineering), length 3.</param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="stress">xx, yy, zz, xy [MPa], length 4, overwritten.</param>
    /// <param name="outOfPlane">Total strain out of plane; of no effect when free.</param>
    public void Stress(ReadOnlySpan<double> strain, double temperatureChange, Span<double> stress, double outOfPlane = 0)
    {
        double xx = strain[0] - _expansion[0] * temperatureChange + _outOfPlaneByStress[0] * outOfPlane;
        double yy = strain[1] - _expansion[1] * temperatureChange + _outOfPlaneByStress[1] * outOfPlane;
        double xy = strain[2] - _expansion[2] * temperatureChange + _outOfPlaneByStress[2] * outOfPlane;
        double[] d = _stiffness;
        stress[0] = d[0] * xx + d[1] * yy + d[2] * xy;
        stress[1] = d[3] * xx + d[4] * yy + d[5] * xy;
        stress[3] = d[6] * xx + d[7] * yy + d[8] * xy;
        stress[2] = _outOfPlaneByStress[0] * stress[0] + _outOfPlaneByStress[1] * stress[1] + _outOfPlaneByStress[2] * stress[3]
            + _outOfPlaneByTemperature * temperatureChange + _youngZ * outOfPlane;
    }

    /// <summary>
    /// Elastic energy per volume [MPa = mJ/mm³] of the strain less the thermal strain, all components. Held it is ½·e·D·e + ½·E_z·(alpha_z·dT)², e the
    /// in-plane strain less <see cref="Expansion"/>·dT: the second part is what szz stores when nothing is held in the plane.
    /// </summary>
    /// <param name="strain">Total in-plane strain: xx, yy, xy (engineering), length 3.</param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="outOfPlane">Total strain out of plane; of no effect when free.</param>
    public double EnergyDensity(ReadOnlySpan<double> strain, double temperatureChange, double outOfPlane = 0)
    {
        double xx = strain[0] - _expansion[0] * temperatureChange + _outOfPlaneByStress[0] * outOfPlane;
        double yy = strain[1] - _expansion[1] * temperatureChange + _outOfPlaneByStress[1] * outOfPlane;
        double xy = strain[2] - _expansion[2] * temperatureChange + _outOfPlaneByStress[2] * outOfPlane;
        double[] d = _stiffness;
        double inPlane = xx * (d[0] * xx + d[1] * yy + d[2] * xy) + yy * (d[3] * xx + d[4] * yy + d[5] * xy) + xy * (d[6] * xx + d[7] * yy + d[8] * xy);
        return 0.5 * inPlane + _blockedEnergy * temperatureChange * temperatureChange + (_outOfPlaneByTemperature * temperatureChange + 0.5 * _youngZ * outOfPlane) * outOfPlane;
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
        double outOfPlane = strain.Length > 3 ? strain[3] : 0;
        Stress(strain, temperatureChange, stress, outOfPlane);
        Tangent(strain.Length, tangent);
        if (!byTemperature.IsEmpty)
            StressByTemperature(byTemperature);
        double byChange = 2 * _blockedEnergy * temperatureChange + _outOfPlaneByTemperature * outOfPlane - (_expansion[0] * stress[0] + _expansion[1] * stress[1] + _expansion[2] * stress[3]);
        return new PlaneEnergy(EnergyDensity(strain, temperatureChange, outOfPlane), 0, byChange);
    }

    /// <summary>Stiffness over xx, yy, xy, or over xx, yy, xy, zz where four are wanted (held).</summary>
    internal void Tangent(int size, Span<double> tangent)
    {
        if (size == 3)
        {
            Stiffness.CopyTo(tangent);
            return;
        }
        double zz = _youngZ;
        for (int i = 0; i < 3; i++)
        {
            double coupled = 0;
            for (int j = 0; j < 3; j++)
            {
                tangent[4 * i + j] = _stiffness[3 * i + j];
                coupled += _stiffness[3 * i + j] * _outOfPlaneByStress[j];
            }
            tangent[4 * i + 3] = tangent[12 + i] = coupled;
            zz += _outOfPlaneByStress[i] * coupled;
        }
        tangent[15] = zz;
    }

    /// <summary>Change of stress with temperature at fixed strain [MPa/K]: xx, yy, xy, and zz where the length is 4; overwritten.</summary>
    internal void StressByTemperature(Span<double> byTemperature)
    {
        for (int i = 0; i < 3; i++)
            byTemperature[i] = -(_stiffness[3 * i] * _expansion[0] + _stiffness[3 * i + 1] * _expansion[1] + _stiffness[3 * i + 2] * _expansion[2]);
        if (byTemperature.Length > 3)
            byTemperature[3] = _outOfPlaneByStress[0] * byTemperature[0] + _outOfPlaneByStress[1] * byTemperature[1] + _outOfPlaneByStress[2] * byTemperature[2] + _outOfPlaneByTemperature;
    }

    private static void StrainRotation(double angle, Span<double> rotation)
    {
        (double s, double c) = Math.SinCos(angle);
        rotation[0] = c * c;
        rotation[1] = s * s;
        rotation[2] = c * s;
        rotation[3] = s * s;
        rotation[4] = c * c;
        rotation[5] = -c * s;
        rotation[6] = -2 * c * s;
        rotation[7] = 2 * c * s;
        rotation[8] = c * c - s * s;
    }

    private static double[] Turned(ReadOnlySpan<double> rotation, double[] strain)
    {
        double[] turned = new double[3];
        for (int i = 0; i < 3; i++)
            turned[i] = rotation[3 * i] * strain[0] + rotation[3 * i + 1] * strain[1] + rotation[3 * i + 2] * strain[2];
        return turned;
    }

    // Diagonal of the inverse stiffness by cofactors.
    private static (double Young, double Shear) BeamModuli(double[] d)
    {
        double alongX = d[4] * d[8] - d[5] * d[7];
        double shear = d[0] * d[4] - d[1] * d[3];
        double determinant = d[0] * alongX - d[1] * (d[3] * d[8] - d[5] * d[6]) + d[2] * (d[3] * d[7] - d[4] * d[6]);
        return (determinant / alongX, determinant / shear);
    }
}
