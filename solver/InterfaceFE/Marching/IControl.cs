namespace InterfaceFE.Marching;

/// <summary>The equation that fixes how far a stride goes: zero when the stride is done.</summary>
public interface IControl
{
    /// <summary>Name in logs and records.</summary>
    string Name { get; }

    /// <summary>Length of the stride in the control's own measure; scales its equation.</summary>
    double Stride { get; }

    /// <summary>Whether the progress is given from the start, so that only the displacement is sought.</summary>
    bool FixesProgress { get; }

    /// <summary>Value of the equation at the tentative point, with its derivatives.</summary>
    /// <param name="equilibrium">The tentative point.</param>
    /// <param name="gradient">d equation / d unknown, overwritten.</param>
    /// <param name="byProgress">d equation / d progress.</param>
    double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress);
}

/// <summary>The stage's own control: progress is given (displacement, force or temperature).</summary>
/// <param name="target">Progress at the end of the stride.</param>
/// <param name="stride">Length of the stride in progress.</param>
public sealed class OwnControl(double target, double stride) : IControl
{
    /// <summary>Name in logs and records.</summary>
    public const string Label = "own";

    /// <inheritdoc/>
    public string Name => Label;

    /// <inheritdoc/>
    public double Stride { get; } = stride;

    /// <summary>Progress at the end of the stride.</summary>
    public double Target { get; } = target;

    /// <inheritdoc/>
    public bool FixesProgress => true;

    /// <inheritdoc/>
    public double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress)
    {
        gradient.Clear();
        byProgress = 1;
        return equilibrium.Progress - Target;
    }
}

/// <summary>
/// Layer work: the area under the laws over all joints grows by a given amount. Its gradient is the layer force, so the control costs nothing; it grows through
/// snap-back and snap-through alike, as the process zone moves on.
/// </summary>
/// <param name="target">Layer work at the end of the stride [mJ].</param>
/// <param name="stride">Growth of layer work [mJ].</param>
public sealed class LayerWorkControl(double target, double stride) : IControl
{
    /// <summary>Name in logs and records.</summary>
    public const string Label = "layer work";

    /// <inheritdoc/>
    public string Name => Label;

    /// <inheritdoc/>
    public double Stride { get; } = stride;

    /// <inheritdoc/>
    public bool FixesProgress => false;

    /// <inheritdoc/>
    public double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress)
    {
        equilibrium.LayerForce.CopyTo(gradient);
        byProgress = equilibrium.LayerWorkByProgress;
        return equilibrium.LayerWork - target;
    }
}

/// <summary>
/// Dissipated energy of the layers grows by a given amount, with its gradient from the laws (after Gutierrez 2004; Verhoosel, Remmers and Gutierrez 2009). It grows even where the rest of the
/// bond gives back more than the front takes, so that layer work falls; it needs damage that grows.
/// </summary>
/// <param name="target">Dissipated energy at the end of the stride [mJ].</param>
/// <param name="stride">Growth of dissipated energy [mJ].</param>
public sealed class DissipationControl(double target, double stride) : IControl
{
    /// <summary>Name in logs and records.</summary>
    public const string Label = "dissipation";

    /// <inheritdoc/>
    public string Name => Label;

    /// <inheritdoc/>
    public double Stride { get; } = stride;

    /// <inheritdoc/>
    public bool FixesProgress => false;

    /// <inheritdoc/>
    public double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress)
    {
        equilibrium.DissipationGradient.CopyTo(gradient);
        byProgress = equilibrium.DissipationByProgress;
        return equilibrium.Energy.SpentInLayers - target;
    }
}

/// <summary>
/// Arc length over watched separations: the length of their way from the accepted point (after Riks 1979 and Crisfield 1981, with a normal that follows the iterations). Only
/// separations are watched, since they grow while travel and load may turn back together.
/// </summary>
/// <param name="watched">Pairs of unknowns whose difference is watched: upper less lower; a lower of -1 watches the unknown itself.</param>
/// <param name="direction">Way of the last stride over all unknowns, used while the way is still zero [mm].</param>
/// <param name="stride">Arc length [mm].</param>
public sealed class ArcLengthControl(IReadOnlyList<(int Upper, int Lower)> watched, double[] direction, double stride) : IControl
{
    /// <summary>Name in logs and records.</summary>
    public const string Label = "arc length";

    /// <inheritdoc/>
    public string Name => Label;

    /// <inheritdoc/>
    public double Stride { get; } = stride;

    /// <inheritdoc/>
    public bool FixesProgress => false;

    /// <inheritdoc/>
    public double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress)
    {
        gradient.Clear();
        byProgress = 0;
        ReadOnlySpan<double> now = equilibrium.Displacement, before = equilibrium.AcceptedDisplacement;
        double length = Length(now, before);
        bool standing = length < 1e-9 * Stride;
        double norm = standing ? Length(direction, []) : length;
        foreach ((int upper, int lower) in watched)
        {
            double way = (standing ? Way(direction, [], upper, lower) : Way(now, before, upper, lower)) / norm;
            gradient[upper] += way;
            if (lower >= 0)
                gradient[lower] -= way;
        }
        return length - Stride;
    }

    /// <summary>Length of a way of the watched separations [mm].</summary>
    /// <param name="to">Unknowns at its end.</param>
    /// <param name="from">Unknowns at its start; empty for zeros.</param>
    public double Length(ReadOnlySpan<double> to, ReadOnlySpan<double> from)
    {
        double sum = 0;
        foreach ((int upper, int lower) in watched)
        {
            double way = Way(to, from, upper, lower);
            sum += way * way;
        }
        return Math.Sqrt(sum);
    }

    private static double Way(ReadOnlySpan<double> to, ReadOnlySpan<double> from, int upper, int lower)
    {
        double way = to[upper] - (from.IsEmpty ? 0 : from[upper]);
        return lower < 0 ? way : way - (to[lower] - (from.IsEmpty ? 0 : from[lower]));
    }
}
