namespace InterfaceFE.Mechanics.Layers;

/// <summary>Line that gives the frame of a layer: tangent and normal.</summary>
public enum LayerFrame
{
    /// <summary>Half way between the faces.</summary>
    MidLine,

    /// <summary>The upper face.</summary>
    UpperFace,

    /// <summary>The lower face.</summary>
    LowerFace,
}

/// <summary>How opening and sliding follow from displacements.</summary>
/// <param name="Frame">Line whose tangent and normal they are taken along.</param>
/// <param name="Turns">Whether rotations are finite; else everything is linear in the displacements.</param>
public readonly record struct LayerKinematics(LayerFrame Frame, bool Turns);
