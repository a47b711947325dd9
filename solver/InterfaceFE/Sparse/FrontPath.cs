namespace InterfaceFE.Sparse;

/// <summary>
/// The fronts from some unknowns up to the root: what a solve must pass through whose right side and wanted values lie on these unknowns. Made by
/// <see cref="SparsePlan.PathOf"/>, immutable, shared by all factors of the plan.
/// </summary>
public sealed class FrontPath
{
    internal FrontPath(int[] fronts, int unknownCount)
    {
        Fronts = fronts;
        UnknownCount = unknownCount;
    }

    /// <summary>Number of fronts, the root not counted.</summary>
    public int FrontCount => Fronts.Length;

    /// <summary>Number of unknowns whose values a solve along the path gives, those of the root included.</summary>
    public int UnknownCount { get; }

    /// <summary>Fronts, rising; with each its ancestors.</summary>
    internal int[] Fronts { get; }
}
