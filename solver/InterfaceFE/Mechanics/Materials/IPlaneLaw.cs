namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// A material law at a point of a plane model: a pure function of the accepted state and the strain. The strain is handed in by the kinematics, whatever its measure (small, or logarithmic
/// or small in a frame that turns along); stress, tangent and energies belong to that measure. Immutable and safe to share between threads; calling it twice with the same
/// arguments gives the same bytes. Never throws on finite input; non-finite input gives a non-finite answer.
/// </summary>
public interface IPlaneLaw
{
    /// <summary>Number of doubles of state of a point; a virgin point holds zeros.</summary>
    int StateSize { get; }

    /// <summary>Answer at a strain, and the state that goes with it.</summary>
    /// <param name="strain">
    /// Total strain at the end of the stride: xx, yy, xy (engineering), length 3; a law that is held out of plane also takes a fourth, zz, and then answers with four rows and columns
    /// in <paramref name="tangent"/> and <paramref name="byTemperature"/>.
    /// </param>
    /// <param name="temperatureChange">Temperature change from the stress-free state [K].</param>
    /// <param name="accepted">State at the last accepted point, length <see cref="StateSize"/>.</param>
    /// <param name="tentative">State at the end of the stride, same length, overwritten; must not alias <paramref name="accepted"/>.</param>
    /// <param name="stress">xx, yy, zz, xy [MPa], length 4, overwritten.</param>
    /// <param name="tangent">Derivative of the in-plane stress (xx, yy, xy) by the strain [MPa], row-major 3×3, symmetric, overwritten.</param>
    /// <param name="byTemperature">Derivative of the in-plane stress (xx, yy, xy) by temperature at fixed strain [MPa/K], overwritten; empty when not wanted.</param>
    /// <returns>Energies per volume.</returns>
    PlaneEnergy Update(
        ReadOnlySpan<double> strain,
        double temperatureChange,
        ReadOnlySpan<double> accepted,
        Span<double> tentative,
        Span<double> stress,
        Span<double> tangent,
        Span<double> byTemperature = default);
}

/// <summary>Energies of a point per volume [mJ/mm³], or of an element [mJ].</summary>
/// <param name="Stored">Elastic energy, and what moved yield surfaces store.</param>
/// <param name="Dissipated">Energy dissipated since the virgin state; never falls.</param>
/// <param name="StoredByTemperature">Change of the stored energy with temperature at fixed strain and plastic strain [.../K].</param>
public readonly record struct PlaneEnergy(double Stored, double Dissipated, double StoredByTemperature = 0);
