namespace InterfaceFE.Mechanics.Layers;

/// <summary>Jump across a layer in the frame of its line [mm], free opening already taken off.</summary>
/// <param name="Opening">Positive apart.</param>
/// <param name="Sliding">Positive when the upper face moves to the line's +x.</param>
public readonly record struct Separation(double Opening, double Sliding);

/// <summary>Conditions at a point of a layer.</summary>
/// <param name="Temperature">Temperature [K].</param>
/// <param name="TimeStride">Time since the accepted point [s].</param>
public readonly record struct LawPoint(double Temperature, double TimeStride);

/// <summary>On which branch a law answers.</summary>
public enum LawBranch
{
    /// <summary>Nothing damaged, nothing growing.</summary>
    Elastic,

    /// <summary>Damage grows with the separation.</summary>
    Growing,

    /// <summary>Damaged before, now unloading or reloading below the largest separation.</summary>
    Unloading,

    /// <summary>On the release branch of the energy criterion, still giving way.</summary>
    Releasing,

    /// <summary>No traction left (contact apart).</summary>
    Separated,
}

/// <summary>
/// Answer of a law. Tractions in MPa: peel positive in tension, shear positive along positive sliding. The tangent is d(peel, shear)/d(opening, sliding) in
/// MPa/mm. Energies per area of layer in N/mm.
/// </summary>
public struct LayerResponse
{
    /// <summary>Peel traction [MPa].</summary>
    public double Peel { get; set; }

    /// <summary>Shear traction [MPa].</summary>
    public double Shear { get; set; }

    /// <summary>d peel / d opening [MPa/mm].</summary>
    public double PeelByOpening { get; set; }

    /// <summary>d peel / d sliding [MPa/mm].</summary>
    public double PeelBySliding { get; set; }

    /// <summary>d shear / d opening [MPa/mm].</summary>
    public double ShearByOpening { get; set; }

    /// <summary>d shear / d sliding [MPa/mm].</summary>
    public double ShearBySliding { get; set; }

    /// <summary>Energy stored that unloading gives back, contact included [N/mm].</summary>
    public double Stored { get; set; }

    /// <summary>Energy dissipated since the virgin state [N/mm]; never falls.</summary>
    public double Dissipated { get; set; }

    /// <summary>Energy spent in friction since the virgin state [N/mm], not part of <see cref="Dissipated"/>; never falls.</summary>
    public double SpentInFriction { get; set; }

    /// <summary>d dissipated / d opening in the tentative stride [MPa]; 0 where nothing grows.</summary>
    public double DissipatedByOpening { get; set; }

    /// <summary>d dissipated / d sliding in the tentative stride [MPa].</summary>
    public double DissipatedBySliding { get; set; }

    /// <summary>Overall damage, 0 virgin to 1 separated; never falls.</summary>
    public double Damage { get; set; }

    /// <summary>Share of the mode-I toughness spent, G_I as counted [N/mm].</summary>
    public double EnergyPeel { get; set; }

    /// <summary>Share of the mode-II toughness spent, G_II as counted [N/mm].</summary>
    public double EnergyShear { get; set; }

    /// <summary>Branch.</summary>
    public LawBranch Branch { get; set; }
}

/// <summary>
/// A cohesive law at a point: a pure function of the accepted state and the tentative separation. Immutable and safe to share between threads.
/// Calling it twice with the same arguments gives the same bytes. Never throws on finite input; non-finite input gives a non-finite answer.
/// </summary>
public interface ILayerLaw
{
    /// <summary>Number of doubles of state of a point; a virgin point holds zeros.</summary>
    int StateSize { get; }

    /// <summary>Whether the tangent is symmetric on every branch.</summary>
    bool HasSymmetricTangent { get; }

    /// <summary>Whether the tractions depend on time: the work under the law at one place is then not the energy release rate of the whole.</summary>
    bool DependsOnTime => false;

    /// <summary>Stiffness of virgin peel and shear, and of contact [MPa/mm].</summary>
    LayerStiffness Stiffness { get; }

    /// <summary>Toughness of pure peel [N/mm].</summary>
    double PeelToughness { get; }

    /// <summary>Toughness of pure shear [N/mm].</summary>
    double ShearToughness { get; }

    /// <summary>Opening at which the traction of pure peel is gone [mm].</summary>
    double FinalOpening { get; }

    /// <summary>Sliding at which the traction of pure shear is gone [mm].</summary>
    double FinalSliding { get; }

    /// <summary>Answer at a separation, and the state that goes with it.</summary>
    /// <param name="separation">Separation at the end of the stride.</param>
    /// <param name="at">Conditions.</param>
    /// <param name="accepted">State at the last accepted point, length <see cref="StateSize"/>.</param>
    /// <param name="tentative">State at the end of the stride, same length, overwritten; must not alias <paramref name="accepted"/>.</param>
    LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative);
}

/// <summary>Initial stiffnesses of a layer [MPa/mm].</summary>
/// <param name="Peel">Peel in tension.</param>
/// <param name="Shear">Shear.</param>
/// <param name="Contact">Pressed together.</param>
public readonly record struct LayerStiffness(double Peel, double Shear, double Contact);
