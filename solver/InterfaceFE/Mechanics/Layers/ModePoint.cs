namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// A mode on its own curve: traction T(m) while the separation grows, m the largest separation so far, else on the line from (m, T(m)) to the plastic separation p·(m - T(m)/k) with the
/// plastic share p; p = 0 is the secant to the origin, p = 1 the initial stiffness k. Distances count from the plastic separation: the mode is elastic up to the reach (1 - p)·m + p·T(m)/k
/// and grows beyond, m by as much as the distance. In shear that holds in both senses: after a reversal the mode yields the other way at the same traction and m goes on growing.
/// Where the distance equals the reach beyond the elastic limit the growing answer is given, so that the first iteration of a stride predicts growth.
/// </summary>
internal readonly struct ModePoint
{
    private const double RoundOff = 1e-14;

    /// <summary>Point of a curve.</summary>
    /// <param name="curve">Curve of the mode.</param>
    /// <param name="plasticShare">p, 0 to 1.</param>
    /// <param name="distance">Distance from the plastic separation before [mm], ≥ 0.</param>
    /// <param name="largestBefore">Largest separation so far [mm].</param>
    public ModePoint(ITractionCurve curve, double plasticShare, double distance, double largestBefore)
    {
        double reachBefore = ReachOf(curve, plasticShare, largestBefore);
        // A distance that has been there before comes back with a last digit of the plastic separation's sum.
        AtLargest = distance >= reachBefore - (plasticShare == 0 ? 0 : RoundOff * largestBefore);
        Largest = !AtLargest ? largestBefore : plasticShare == 0 ? distance : largestBefore + Math.Max(0, distance - reachBefore);
        Growing = AtLargest && Largest >= curve.ElasticLimit;
        Damaged = Largest > curve.ElasticLimit;
        LargestTraction = curve.Traction(Largest);
        Reach = ReachOf(curve, plasticShare, Largest);
        PlasticGrowth = plasticShare == 0 || !Growing ? 0 : Math.Max(0, Largest - Reach - (largestBefore - reachBefore));
        Separation = AtLargest ? Reach : distance;
        Secant = Damaged ? LargestTraction > 0 ? LargestTraction / Reach : 0 : curve.Stiffness;
        Traction = Growing ? LargestTraction : Secant * Separation;
        double curveSlope = Growing ? curve.Slope(Largest) : 0;
        Slope = Growing ? curveSlope : Secant;
        ReachSlope = plasticShare == 0 ? 1 : 1 - plasticShare + plasticShare * curveSlope / curve.Stiffness;
    }

    /// <summary>Distance from the plastic separation with this point [mm]: the elastic part.</summary>
    public double Separation { get; }

    /// <summary>Whether the distance has come to the reach.</summary>
    public bool AtLargest { get; }

    /// <summary>Largest separation m with this one [mm].</summary>
    public double Largest { get; }

    /// <summary>Elastic distance at the largest separation [mm].</summary>
    public double Reach { get; }

    /// <summary>What this point adds to the plastic separation [mm], ≥ 0.</summary>
    public double PlasticGrowth { get; }

    /// <summary>Traction of the curve at the largest separation [MPa].</summary>
    public double LargestTraction { get; }

    /// <summary>Stiffness of unloading [MPa/mm].</summary>
    public double Secant { get; }

    /// <summary>Traction t [MPa].</summary>
    public double Traction { get; }

    /// <summary>dt/dx, from the growing side at kinks [MPa/mm].</summary>
    public double Slope { get; }

    /// <summary>Whether damage grows with x.</summary>
    public bool Growing { get; }

    /// <summary>Whether the largest separation is beyond the elastic limit.</summary>
    public bool Damaged { get; }

    /// <summary>Stored energy ½·t·(elastic distance) [N/mm].</summary>
    public double Stored => 0.5 * Traction * Separation;

    /// <summary>d(plastic separation)/dx while growing, else 0.</summary>
    public double PlasticSlope => Growing ? 1 - ReachSlope : 0;

    private double ReachSlope { get; }

    /// <summary>Elastic distance at a largest separation [mm].</summary>
    public static double ReachOf(ITractionCurve curve, double plasticShare, double largest) =>
        plasticShare == 0 || largest <= curve.ElasticLimit ? largest : (1 - plasticShare) * largest + plasticShare * curve.Traction(largest) / curve.Stiffness;

    /// <summary>Dissipated energy A(m) - ½·T(m)·reach [N/mm].</summary>
    public double Dissipated(ITractionCurve curve) => Damaged ? Math.Max(0, curve.Area(Largest) - 0.5 * LargestTraction * Reach) : 0;

    /// <summary>d dissipated / dx = T - ½·(T'·reach + T·reach') while growing, else 0 [MPa].</summary>
    public double DissipatedSlope => Growing ? 0.5 * ((2 - ReachSlope) * Traction - Slope * Reach) : 0;
}
