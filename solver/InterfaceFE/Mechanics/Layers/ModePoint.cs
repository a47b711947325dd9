namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// A mode on its own curve: traction T(x) while the separation x is the largest so far, else on the secant through the origin and (m, T(m)).
/// Where x equals the largest separation beyond the elastic limit the growing answer is given, so that the first iteration of a stride predicts growth.
/// </summary>
internal readonly struct ModePoint
{
    /// <summary>Point of a curve.</summary>
    /// <param name="curve">Curve of the mode.</param>
    /// <param name="separation">x [mm], ≥ 0.</param>
    /// <param name="largestBefore">Largest separation so far [mm].</param>
    public ModePoint(ITractionCurve curve, double separation, double largestBefore)
    {
        Separation = separation;
        Largest = separation >= largestBefore ? separation : largestBefore;
        Growing = separation >= largestBefore && separation >= curve.ElasticLimit;
        Damaged = Largest > curve.ElasticLimit;
        LargestTraction = curve.Traction(Largest);
        Secant = Damaged ? LargestTraction / Largest : curve.Stiffness;
        Traction = Growing ? LargestTraction : Secant * separation;
        Slope = Growing ? curve.Slope(separation) : Secant;
    }

    /// <summary>x [mm].</summary>
    public double Separation { get; }

    /// <summary>Largest separation with this one [mm].</summary>
    public double Largest { get; }

    /// <summary>Traction of the curve at the largest separation [MPa].</summary>
    public double LargestTraction { get; }

    /// <summary>Secant stiffness k [MPa/mm].</summary>
    public double Secant { get; }

    /// <summary>Traction t [MPa].</summary>
    public double Traction { get; }

    /// <summary>dt/dx, from the growing side at kinks [MPa/mm].</summary>
    public double Slope { get; }

    /// <summary>Whether damage grows with x.</summary>
    public bool Growing { get; }

    /// <summary>Whether the largest separation is beyond the elastic limit.</summary>
    public bool Damaged { get; }

    /// <summary>Stored energy ½·t·x [N/mm].</summary>
    public double Stored => 0.5 * Traction * Separation;

    /// <summary>Dissipated energy A(m) - ½·T(m)·m [N/mm].</summary>
    public double Dissipated(ITractionCurve curve) => Damaged ? Math.Max(0, curve.Area(Largest) - 0.5 * LargestTraction * Largest) : 0;

    /// <summary>d dissipated / dx = ½·(T - T'·x) while growing, else 0 [MPa].</summary>
    public double DissipatedSlope => Growing ? 0.5 * (Traction - Slope * Separation) : 0;
}
