namespace InterfaceFE.Mechanics.Materials;

/// <summary>What a return to the yield surface needs to know of a point.</summary>
/// <param name="Bulk">Bulk modulus K [MPa].</param>
/// <param name="Shear">Shear modulus G [MPa].</param>
/// <param name="Moving">Kinematic hardening H [MPa].</param>
/// <param name="Curve">Yield stress.</param>
/// <param name="Share">Share of the curve at the temperature.</param>
/// <param name="Before">Accepted equivalent plastic strain.</param>
/// <param name="Tolerance">Stress by which the trial must exceed yield [MPa]: what rounding can make.</param>
internal readonly record struct YieldInput(double Bulk, double Shear, double Moving, YieldCurve Curve, double Share, double Before, double Tolerance);

/// <summary>What a return found.</summary>
/// <param name="Growth">Growth of the equivalent plastic strain; 0 where the point stays elastic.</param>
/// <param name="TableStress">Stress of the table at the new equivalent plastic strain [MPa], before the share of temperature.</param>
internal readonly record struct YieldOutput(double Growth, double TableStress);

/// <summary>
/// Return to the yield surface with all strains given: radial (Wilkins 1964; consistent tangent of Simo and Taylor, Comput. Methods Appl. Mech. Eng. 48 (1985) 101-118, both from memory;
/// derived here). With the trial's shifted deviator x, q its von Mises size and N = x/q, the growth d solves q - (3G + H)·d = sigma(kappa + d); the stress loses 3G·d·N, the
/// plastic strain gains 3/2·d·N. With h the slope of sigma the tangent is K·1⊗1 + 2G(1 - 3G·d/q)·(deviator) - 9G²·[1/(3G + H + h) - d/q]·N⊗N.
/// </summary>
internal static class RadialReturn
{
    /// <summary>Stress at a trial elastic strain.</summary>
    /// <param name="point">The point.</param>
    /// <param name="elastic">Trial elastic strain xx, yy, zz, xy (engineering).</param>
    /// <param name="plastic">Plastic strain xx, yy, xy (engineering) and on, brought up to date.</param>
    /// <param name="stress">xx, yy, zz, xy [MPa], overwritten.</param>
    /// <param name="moduli">Tangent over xx, yy, xy, zz, row-major 4×4, overwritten where the point yields.</param>
    /// <param name="byYield">Change of stress xx, yy, xy, zz by a unit of yield stress, overwritten where the point yields.</param>
    public static YieldOutput Stress(in YieldInput point, ReadOnlySpan<double> elastic, Span<double> plastic, Span<double> stress, Span<double> moduli, Span<double> byYield)
    {
        double g = point.Shear, volume = elastic[0] + elastic[1] + elastic[2], pressure = point.Bulk * volume;
        double sx = 2 * g * (elastic[0] - volume / 3), sy = 2 * g * (elastic[1] - volume / 3), sz = 2 * g * (elastic[2] - volume / 3), sxy = g * elastic[3];
        stress[0] = sx + pressure;
        stress[1] = sy + pressure;
        stress[2] = sz + pressure;
        stress[3] = sxy;
        double back = 2 * point.Moving / 3;
        double x = sx - back * plastic[0], y = sy - back * plastic[1], z = sz + back * (plastic[0] + plastic[1]), xy = sxy - 0.5 * back * plastic[2];
        double q = Math.Sqrt(1.5 * (x * x + y * y + z * z + 2 * xy * xy));
        double excess = q - point.Share * point.Curve.At(point.Before).Stress;
        if (!(excess > point.Tolerance))
            return default;
        double growth = point.Curve.Growth(point.Before, excess, 3 * g + point.Moving, point.Share, out double slope);
        ReadOnlySpan<double> n = [x / q, y / q, xy / q, z / q];
        double off = 3 * g * growth;
        stress[0] -= off * n[0];
        stress[1] -= off * n[1];
        stress[2] -= off * n[3];
        stress[3] -= off * n[2];
        plastic[0] += 1.5 * growth * n[0];
        plastic[1] += 1.5 * growth * n[1];
        plastic[2] += 3 * growth * n[2];

        double stiffness = 3 * g + point.Moving + point.Share * slope, ratio = growth / q;
        double deviator = 2 * g * (1 - 3 * g * ratio), along = 9 * g * g * (1 / stiffness - ratio);
        for (int i = 0; i < 4; i++)
        {
            for (int j = 0; j < 4; j++)
                moduli[4 * i + j] = (i == 2 || j == 2 ? 0 : point.Bulk - deviator / 3) - along * n[i] * n[j];
            moduli[5 * i] += i == 2 ? 0.5 * deviator : deviator;
            byYield[i] = 3 * g / stiffness * n[i];
        }
        return new YieldOutput(growth, point.Curve.At(point.Before + growth).Stress);
    }
}
