namespace InterfaceFE.Marching;

/// <summary>
/// Words for how a search stands at an iteration, as convergence.csv has them. The last row of a search says whether its point was taken: <see cref="Converged"/> and
/// <see cref="AtFloor"/> alone mean that it was.
/// </summary>
public static class IterationReason
{
    /// <summary>Within tolerance, and taken as a point.</summary>
    public const string Converged = "converged";

    /// <summary>As good as rounding allows, and taken as a point.</summary>
    public const string AtFloor = "converged at the floor";

    /// <summary>Converged, but past the end of the stage: the end itself is sought next, on the straight way to here.</summary>
    public const string PastEnd = "converged past the stage's end";

    /// <summary>Converged, but the stride is refused for its energy error.</summary>
    public const string TooLong = "converged, but the energy error of the stride is too large";

    /// <summary>Converged, but on the way that the path came.</summary>
    public const string WentBack = "converged, but the stride went back the way it came";
}
