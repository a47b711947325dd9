namespace InterfaceFE.Mechanics.Elements;

/// <summary>How well a plane element is shaped.</summary>
/// <param name="Area">Area [mm²] by the element's own Gauss points; negative when its nodes run clockwise.</param>
/// <param name="SmallestRatio">
/// Smallest determinant of the map's Jacobian at the nodes and Gauss points over its mean at the Gauss points: 1 for a parallelogram, 0 or less for an
/// element that is folded or inverted somewhere, NaN where coordinates are not finite. For a quadrilateral with straight sides the nodes hold the smallest
/// value of the whole element; with curved sides the value is that of the sampled points.
/// </param>
public readonly record struct ElementShape(double Area, double SmallestRatio)
{
    /// <summary>Whether the element can be used: area and every sampled determinant above 0.</summary>
    public bool IsValid => Area > 0 && SmallestRatio > 0;
}
