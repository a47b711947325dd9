namespace InterfaceFE.Mechanics.Layers;

/// <summary>Frame of an undeformed mid-line at a point.</summary>
/// <param name="X">x of the point [mm].</param>
/// <param name="Y">y of the point [mm].</param>
/// <param name="TangentX">x of the unit tangent, start to end.</param>
/// <param name="TangentY">y of the unit tangent.</param>
/// <param name="Stretch">dl/dξ [mm]; weights times this sum to the length.</param>
public readonly record struct PointFrame(double X, double Y, double TangentX, double TangentY, double Stretch)
{
    /// <summary>x of the unit normal, from lower to upper.</summary>
    public double NormalX => -TangentY;

    /// <summary>y of the unit normal.</summary>
    public double NormalY => TangentX;
}
