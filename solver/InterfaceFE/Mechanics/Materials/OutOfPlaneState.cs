namespace InterfaceFE.Mechanics.Materials;

/// <summary>What a plane model assumes of the third direction.</summary>
public enum OutOfPlaneState
{
    /// <summary>Plane strain: the total strain out of plane is 0.</summary>
    Held,

    /// <summary>Plane stress: the stress out of plane is 0.</summary>
    Free,
}
