namespace InterfaceFE.Mechanics.Layers;

/// <summary>
/// Curve of traction against separation of one mode under growing separation. Immutable. Separation w >= 0 in mm, traction in MPa, area in N/mm.
/// Traction over separation never rises with w, so that damage never falls.
/// </summary>
public interface ITractionCurve
{
    /// <summary>Separation up to which the curve is linear and elastic [mm], > 0.</summary>
    double ElasticLimit { get; }

    /// <summary>Separation from which the traction is 0 [mm].</summary>
    double FinalSeparation { get; }

    /// <summary>Initial stiffness [MPa/mm].</summary>
    double Stiffness { get; }

    /// <summary>Largest traction [MPa].</summary>
    double Strength { get; }

    /// <summary>Area under the whole curve [N/mm].</summary>
    double Toughness { get; }

    /// <summary>Separation at which the traction first reaches its largest value [mm].</summary>
    double PeakSeparation { get; }

    /// <summary>Traction at a separation [MPa].</summary>
    double Traction(double separation);

    /// <summary>Slope of the curve, from the right at kinks [MPa/mm].</summary>
    double Slope(double separation);

    /// <summary>Area from 0 to a separation [N/mm].</summary>
    double Area(double separation);
}
