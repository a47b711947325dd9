using InterfaceFE.Model;

namespace InterfaceFE.Marching;

/// <summary>What an evaluation of the residual found.</summary>
/// <param name="OutOfBalance">Largest force out of balance over the unknowns that are not held [N].</param>
/// <param name="Reference">Largest summed magnitude of element forces at an unknown [N].</param>
/// <param name="Finite">Whether every number is finite.</param>
/// <param name="HeldInPlace">Whether every held unknown stands where the progress wants it.</param>
/// <param name="ChangedElements">Elements whose tangent differs from the one in the factor; 0 unless tangents were wanted.</param>
/// <param name="WorkShare">Work of the forces out of balance on the way from the accepted point, over the sum of magnitudes of the internal forces' work on it; 0 for no way.</param>
public readonly record struct ResidualReport(double OutOfBalance, double Reference, bool Finite, bool HeldInPlace, int ChangedElements, double WorkShare = 0)
{
    /// <summary>Out of balance over reference; 0 when nothing carries force.</summary>
    public double Relative => Reference > 0 ? OutOfBalance / Reference : 0;
}

/// <summary>A solved correction.</summary>
/// <param name="Largest">Largest change of a displacement [mm].</param>
/// <param name="Progress">Change of progress.</param>
/// <param name="ControlError">Value of the control equation before the correction, relative to its stride.</param>
/// <param name="Singular">The unknown of the first pivot that was numerically zero; -1 when none.</param>
/// <param name="Finite">Whether the correction is finite.</param>
public readonly record struct Correction(double Largest, double Progress, double ControlError, int Singular, bool Finite);

/// <summary>
/// The discrete equilibrium of one stage at a tentative displacement and progress. Newton sees only this; a lazy form that evaluates what changed can stand
/// in for the full one.
/// </summary>
public interface IEquilibrium
{
    /// <summary>Share of the stage's target.</summary>
    double Progress { get; set; }

    /// <summary>Tentative values of the unknowns.</summary>
    ReadOnlySpan<double> Displacement { get; }

    /// <summary>Values of the unknowns at the accepted point.</summary>
    ReadOnlySpan<double> AcceptedDisplacement { get; }

    /// <summary>Progress of the accepted point.</summary>
    double AcceptedProgress { get; }

    /// <summary>Internal force at the tentative displacement, by the latest evaluation [N].</summary>
    ReadOnlySpan<double> InternalForce { get; }

    /// <summary>Part of <see cref="InternalForce"/> that the layers carry: the gradient of <see cref="LayerWork"/> [N].</summary>
    ReadOnlySpan<double> LayerForce { get; }

    /// <summary>Energies by the latest evaluation.</summary>
    EnergyState Energy { get; }

    /// <summary>Area under the laws over all joints: stored and dissipated [mJ].</summary>
    double LayerWork => Energy.StoredInLayers + Energy.SpentInLayers;

    /// <summary>d layer work / d progress at fixed displacement (free opening by temperature) [mJ].</summary>
    double LayerWorkByProgress { get; }

    /// <summary>d dissipated energy of the layers / d unknown in the tentative stride, by the latest evaluation that wanted it [N].</summary>
    ReadOnlySpan<double> DissipationGradient { get; }

    /// <summary>d dissipated energy / d progress at fixed displacement [mJ].</summary>
    double DissipationByProgress { get; }

    /// <summary>Number of layer elements in which damage grew in the latest evaluation.</summary>
    int GrowingElements { get; }

    /// <summary>Energies less the work of given forces up to the tentative displacement, by the latest evaluation [mJ]: lowest at a stable equilibrium while the progress is given.</summary>
    double Potential { get; }

    /// <summary>Evaluates force, tangent and energies at the tentative displacement and progress.</summary>
    ResidualReport Evaluate(Wanted wanted);

    /// <summary>
    /// The first element whose answer is not finite although the displacements are of a size that it must have an answer for: where it lies and what is wrong, in words. Null when there is
    /// none, or when the displacements themselves are beyond measure.
    /// </summary>
    string? Fault();

    /// <summary>Force below which rounding rules [N]: 50 units of rounding of the largest stiffness times displacement.</summary>
    double ResidualFloor();

    /// <summary>Solves for a correction of displacement and progress by the latest tangents and the control.</summary>
    Correction Solve(IControl control);

    /// <summary>Work of the force out of balance along the latest solved correction, by the latest evaluation [mJ].</summary>
    double WorkAlongCorrection();

    /// <summary>Applies a share of the solved correction to the displacement and progress it started from.</summary>
    void Move(double share);

    /// <summary>Sets the tentative point to the accepted one plus a share of a way, as a first guess.</summary>
    /// <param name="way">Way of every unknown [mm or rad].</param>
    /// <param name="wayProgress">Way of the progress.</param>
    /// <param name="share">Share of the way.</param>
    void Guess(ReadOnlySpan<double> way, double wayProgress, double share);

    /// <summary>Back to the accepted point.</summary>
    void RollBack();

    /// <summary>Accepts the tentative point.</summary>
    void Accept();
}

/// <summary>Energies of the model [mJ].</summary>
/// <param name="StoredInAdherends">Elastic energy of the adherends.</param>
/// <param name="StoredInLayers">Elastic energy of the layers, contact included.</param>
/// <param name="SpentInLayers">Dissipated by the layers.</param>
/// <param name="ByTemperature">d stored / d temperature at fixed displacement [mJ/K], whole model.</param>
public readonly record struct EnergyState(double StoredInAdherends, double StoredInLayers, double SpentInLayers, double ByTemperature)
{
    /// <summary>Dissipated by yielding of the adherends.</summary>
    public double SpentInYielding { get; init; }

    /// <summary>Elastic energy of the load trains.</summary>
    public double StoredInLoadTrains { get; init; }

    /// <summary>Spent in friction of the layers' faces.</summary>
    public double SpentInFriction { get; init; }

    /// <summary>Dissipated by layers, yielding and friction.</summary>
    public double Spent => SpentInLayers + SpentInYielding + SpentInFriction;

    /// <summary>Sum of all.</summary>
    public double Total => StoredInAdherends + StoredInLayers + StoredInLoadTrains + Spent;
}
