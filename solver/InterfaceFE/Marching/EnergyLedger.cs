namespace InterfaceFE.Marching;

/// <summary>Energies and their two checks at a point [mJ].</summary>
/// <param name="PutIn">Work of grips and loads since the start, by the trapezoidal rule.</param>
/// <param name="Thermal">Energy put in by change of temperature, by the trapezoidal rule.</param>
/// <param name="State">Energies of the model.</param>
/// <param name="Balance">Virtual work of external and internal forces over all strides: difference over the sum of magnitudes of the terms or of the energies turned over, whichever is larger.</param>
/// <param name="PathError">Energy put in against the elements' own energies, over the sum of magnitudes.</param>
public readonly record struct EnergyAccount(double PutIn, double Thermal, EnergyState State, double Balance, double PathError);

/// <summary>
/// Keeps account of energy from point to point. Two numbers judge it: <see cref="EnergyAccount.Balance"/> compares the virtual work of external and internal forces
/// with one quadrature on both sides (it sees errors of equilibrium), <see cref="EnergyAccount.PathError"/> compares the work put in with the energies that the elements
/// report themselves (it sees strides that are too long and laws whose energies do not belong to their tractions; of second order in the stride).
/// </summary>
public sealed class EnergyLedger
{
    private const double SmallShare = 0.02;

    /// <summary>Relative errors above these are compared with rounding: a path that costs no energy leaves nothing but rounding to divide by.</summary>
    private const double DoubtfulError = 1e-3, DoubtfulBalance = 1e-10;

    private readonly FullEquilibrium _equilibrium;
    private readonly double[] _displacement, _internal, _external;
    private EnergyState _energy;
    private double _temperature, _putIn, _thermal, _internalWork, _magnitude, _turnover;
    private int _strides;

    /// <summary>Opens the account at the accepted point; the equilibrium must have been evaluated there.</summary>
    public EnergyLedger(FullEquilibrium equilibrium)
    {
        _equilibrium = equilibrium;
        _displacement = equilibrium.AcceptedDisplacement.ToArray();
        _internal = equilibrium.InternalForce.ToArray();
        _external = new double[_internal.Length];
        for (int i = 0; i < _external.Length; i++)
            _external[i] = equilibrium.OutsideForce(i);
        _energy = equilibrium.Energy;
        _temperature = equilibrium.AcceptedTemperature;
    }

    /// <summary>
    /// Error of the tentative stride: energy put in against change of the elements' energies, over the stride's turnover (half the sum of magnitudes) or a fiftieth of the
    /// whole turnover so far, whichever is larger, so that a kink of a law passed in a small stride is no reason to creep up to it. 0 without turnover.
    /// </summary>
    public double StrideError()
    {
        Stride stride = Measure();
        double error = Math.Abs(stride.PutIn + stride.Thermal - (_equilibrium.Energy.Total - _energy.Total));
        double turnover = Math.Max(stride.Turnover, SmallShare * (_turnover + stride.Turnover));
        return Relative(error, turnover, DoubtfulError, 1);
    }

    /// <summary>Books the tentative stride; to be called when the march accepts it.</summary>
    public EnergyAccount Book()
    {
        Stride stride = Measure();
        _putIn += stride.PutIn;
        _thermal += stride.Thermal;
        _internalWork += stride.Internal;
        _magnitude += stride.Magnitude;
        _turnover += stride.Turnover;
        _strides++;
        ReadOnlySpan<double> u = _equilibrium.Displacement;
        u.CopyTo(_displacement);
        _equilibrium.InternalForce.CopyTo(_internal);
        for (int i = 0; i < _external.Length; i++)
            _external[i] = _equilibrium.OutsideForce(i);
        _energy = _equilibrium.Energy;
        _temperature = _equilibrium.Temperature;
        return Account();
    }

    /// <summary>The account as it stands.</summary>
    public EnergyAccount Account()
    {
        double balance = Relative(Math.Abs(_putIn - _internalWork), Math.Max(_magnitude, _turnover), DoubtfulBalance, _strides);
        double pathError = Relative(Math.Abs(_putIn + _thermal - _energy.Total), _turnover, DoubtfulError, _strides);
        return new EnergyAccount(_putIn, _thermal, _energy, balance, pathError);
    }

    /// <summary>Error over scale; 0 without scale, or where a doubtful ratio is one of rounding over rounding.</summary>
    private double Relative(double error, double scale, double doubtful, int strides)
    {
        double relative = scale > 0 ? error / scale : 0;
        return relative > doubtful && error <= strides * _equilibrium.EnergyFloor() ? 0 : relative;
    }

    private Stride Measure()
    {
        double putIn = 0, internalWork = 0, magnitude = 0;
        ReadOnlySpan<double> u = _equilibrium.Displacement, f = _equilibrium.InternalForce;
        for (int i = 0; i < _displacement.Length; i++)
        {
            double way = u[i] - _displacement[i];
            putIn += 0.5 * (_external[i] + _equilibrium.OutsideForce(i)) * way;
            double work = 0.5 * (_internal[i] + f[i]) * way;
            internalWork += work;
            magnitude += Math.Abs(work);
        }
        EnergyState now = _equilibrium.Energy;
        double thermal = 0.5 * (_energy.ByTemperature + now.ByTemperature) * (_equilibrium.Temperature - _temperature);
        double turnover = 0.5 * (Math.Abs(putIn) + Math.Abs(thermal) + Math.Abs(now.StoredInAdherends - _energy.StoredInAdherends)
            + Math.Abs(now.StoredInLayers - _energy.StoredInLayers) + Math.Abs(now.SpentInLayers - _energy.SpentInLayers) + Math.Abs(now.SpentInYielding - _energy.SpentInYielding)
            + Math.Abs(now.StoredInLoadTrains - _energy.StoredInLoadTrains) + Math.Abs(now.SpentInFriction - _energy.SpentInFriction));
        return new Stride(putIn, thermal, internalWork, magnitude, turnover);
    }

    private readonly record struct Stride(double PutIn, double Thermal, double Internal, double Magnitude, double Turnover);
}
