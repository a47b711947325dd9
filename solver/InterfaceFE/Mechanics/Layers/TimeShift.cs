namespace InterfaceFE.Mechanics.Layers;

/// <summary>How the relaxation times move with temperature: times at T are those at the reference temperature times a(T).</summary>
public sealed class TimeShift
{
    private readonly Func<double, double> _speed;

    private TimeShift(Func<double, double> speed) => _speed = speed;

    /// <summary>The same times at every temperature.</summary>
    public static TimeShift None { get; } = new(_ => 1);

    /// <summary>Williams, Landel and Ferry 1955: log10 a = -c1·(T - Tr)/(c2 + T - Tr). At and below Tr - c2 nothing relaxes.</summary>
    /// <param name="reference">Tr [K].</param>
    /// <param name="c1">c1, > 0.</param>
    /// <param name="c2">c2 [K], > 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is not above 0.</exception>
    public static TimeShift Wlf(double reference, double c1, double c2)
    {
        Admissible.Positive(reference, nameof(reference));
        Admissible.Positive(c1, nameof(c1));
        Admissible.Positive(c2, nameof(c2));
        return new TimeShift(t => c2 + t - reference > 0 ? Math.Pow(10, c1 * (t - reference) / (c2 + t - reference)) : 0);
    }

    /// <summary>Arrhenius: ln a = Ta·(1/T - 1/Tr), Ta the activation energy over the gas constant.</summary>
    /// <param name="reference">Tr [K].</param>
    /// <param name="activation">Ta [K], > 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">A number is not above 0.</exception>
    public static TimeShift Arrhenius(double reference, double activation)
    {
        Admissible.Positive(reference, nameof(reference));
        Admissible.Positive(activation, nameof(activation));
        return new TimeShift(t => Math.Exp(activation * (1 / reference - 1 / t)));
    }

    /// <summary>1/a(T).</summary>
    /// <param name="temperature">T [K].</param>
    public double Speed(double temperature) => _speed(temperature);
}
