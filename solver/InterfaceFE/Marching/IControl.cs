namespace InterfaceFE.Marching;

/// <summary>The equation that fixes how far a stride goes: zero when the stride is done.</summary>
public interface IControl
{
    /// <summary>Name in logs.</summary>
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
    /// <inheritdoc/>
    public string Name => "own";

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
    /// <inheritdoc/>
    public string Name => "layer work";

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
/// Arc length over watched unknowns: the length of the way of the watched unknowns and the progress (scaled) from the accepted point (after Riks 1979 and
/// Crisfield 1981, with a normal that follows the iterations).
/// </summary>
/// <param name="watched">Unknowns that are watched: grips and layers that are giving way.</param>
/// <param name="progressScale">Length that a progress of 1 counts for [mm].</param>
/// <param name="direction">Direction of the last stride over all unknowns, used while the way is still zero [mm].</param>
/// <param name="directionProgress">Its progress.</param>
/// <param name="stride">Arc length [mm].</param>
public sealed class ArcLengthControl(int[] watched, double progressScale, double[] direction, double directionProgress, double stride) : IControl
{
    /// <inheritdoc/>
    public string Name => "arc length";

    /// <inheritdoc/>
    public double Stride { get; } = stride;

    /// <inheritdoc/>
    public bool FixesProgress => false;

    /// <inheritdoc/>
    public double Equation(IEquilibrium equilibrium, Span<double> gradient, out double byProgress)
    {
        gradient.Clear();
        ReadOnlySpan<double> now = equilibrium.Displacement, before = equilibrium.AcceptedDisplacement;
        double length = Length(now, before, equilibrium.Progress - equilibrium.AcceptedProgress);
        bool standing = length < 1e-12 * Stride;
        double norm = standing ? DirectionLength() : length;
        foreach (int i in watched)
            gradient[i] = (standing ? direction[i] : now[i] - before[i]) / norm;
        double progress = standing ? directionProgress : equilibrium.Progress - equilibrium.AcceptedProgress;
        byProgress = progressScale * progressScale * progress / norm;
        return length - Stride;
    }

    /// <summary>Length of a way in this control's measure [mm].</summary>
    public double Length(ReadOnlySpan<double> to, ReadOnlySpan<double> from, double progress)
    {
        double sum = progressScale * progress * progressScale * progress;
        foreach (int i in watched)
            sum += (to[i] - from[i]) * (to[i] - from[i]);
        return Math.Sqrt(sum);
    }

    private double DirectionLength()
    {
        double sum = progressScale * directionProgress * progressScale * directionProgress;
        foreach (int i in watched)
            sum += direction[i] * direction[i];
        return Math.Sqrt(sum);
    }
}
