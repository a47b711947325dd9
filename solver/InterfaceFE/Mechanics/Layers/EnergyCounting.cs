namespace InterfaceFE.Mechanics.Layers;

/// <summary>How the energy share G_i of a mode is counted in the energy criterion of independent modes.</summary>
public enum EnergyCounting
{
    /// <summary>Area under the curve up to the largest separation.</summary>
    LargestSeparation,

    /// <summary>Stored plus dissipated along the path.</summary>
    NetWork,
}
