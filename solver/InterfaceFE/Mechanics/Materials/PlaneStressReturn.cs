namespace InterfaceFE.Mechanics.Materials;

/// <summary>
/// Return to the yield surface with no stress out of plane (Simo and Taylor, Int. J. Numer. Meth. Eng. 22 (1986) 649-670, from memory; derived here). Sum a = xx + yy, difference
/// d = xx - yy and shear t uncouple. With the shifted stress x (stress less the back stress, its own zz part taken off) q² = a²/4 + 3d²/4 + 3t²; over a plastic growth l = (growth
/// of kappa)/q each part becomes its trial value times f = 1/(1 + l·(M + H)), M = E/(2(1-nu)) for a and 3G for d and t. The one equation q(l) = sigma(kappa + l·q(l)), falling in l,
/// is solved by Newton's method between bounds.
/// </summary>
internal static class PlaneStressReturn
{
    private const int MostIterations = 100;

    /// <summary>Stress at a trial elastic strain.</summary>
    /// <param name="point">The point.</param>
    /// <param name="elastic">Trial elastic strain xx, yy, (not used), xy (engineering).</param>
    /// <param name="plastic">Plastic strain xx, yy, xy (engineering) and on, brought up to date.</param>
    /// <param name="stress">xx, yy, zz = 0, xy [MPa], overwritten.</param>
    /// <param name="moduli">Tangent over xx, yy, xy, row-major 3×3, overwritten where the point yields.</param>
    /// <param name="byYield">Change of stress xx, yy, xy by a unit of yield stress, overwritten where the point yields.</param>
    public static YieldOutput Stress(in YieldInput point, ReadOnlySpan<double> elastic, Span<double> plastic, Span<double> stress, Span<double> moduli, Span<double> byYield)
    {
        double g = point.Shear, h = point.Moving;
        // E/(1-nu) from K and G: 2G(1+nu)/(1-nu) = 18KG/(3K + 4G).
        double sumModulus = 18 * point.Bulk * g / (3 * point.Bulk + 4 * g), sumFlow = 0.5 * sumModulus, shearFlow = 3 * g;
        double sum = sumModulus * (elastic[0] + elastic[1]), difference = 2 * g * (elastic[0] - elastic[1]), shear = g * elastic[3];
        stress[2] = 0;
        Put(sum, difference, shear, stress);
        // Trial values of the shifted stress.
        double a0 = sum - 2 * h * (plastic[0] + plastic[1]), d0 = difference - 2 * h / 3 * (plastic[0] - plastic[1]), t0 = shear - h / 3 * plastic[2];
        double trial = Size(a0, d0, t0);
        if (!(trial - point.Share * point.Curve.At(point.Before).Stress > point.Tolerance))
            return default;

        double l = Solve(point, a0, d0, t0, sumFlow + h, shearFlow + h);
        double fa = 1 / (1 + l * (sumFlow + h)), fd = 1 / (1 + l * (shearFlow + h));
        double a = fa * a0, d = fd * d0, t = fd * t0, q = Size(a, d, t), growth = l * q;
        sum -= l * sumFlow * a;
        difference -= l * shearFlow * d;
        shear -= l * shearFlow * t;
        Put(sum, difference, shear, stress);
        plastic[0] += 0.5 * l * (0.5 * a + 1.5 * d);
        plastic[1] += 0.5 * l * (0.5 * a - 1.5 * d);
        plastic[2] += 3 * l * t;

        (double table, double slope) = point.Curve.At(point.Before + growth);
        slope *= point.Share;
        double byGrowth = -(0.25 * (sumFlow + h) * fa * a * a + (shearFlow + h) * fd * (0.75 * d * d + 3 * t * t)) / q;
        double grows = 1 - slope * l, denominator = slope * q - grows * byGrowth;
        // Change of stress with l, as xx, yy, xy; the same vector, times q, is the change of q with strain.
        double ra = 0.25 * sumModulus * fa * a, rd = 1.5 * g * fd * d;
        ReadOnlySpan<double> r = [ra + rd, ra - rd, 3 * g * fd * t];
        double ofSum = 0.5 * sumModulus * (1 - l * sumFlow * fa), ofDifference = g * (1 - l * shearFlow * fd);
        double along = grows / (denominator * q);
        for (int i = 0; i < 3; i++)
        {
            for (int j = 0; j < 3; j++)
                moduli[3 * i + j] = (i == 2 || j == 2 ? 0 : i == j ? ofSum + ofDifference : ofSum - ofDifference) - along * r[i] * r[j];
            byYield[i] = r[i] / denominator;
        }
        moduli[8] += ofDifference;
        return new YieldOutput(growth, table);
    }

    /// <summary>Root of size(l) - sigma(kappa + l·size(l)), which falls with l, to the last digits.</summary>
    private static double Solve(in YieldInput point, double a0, double d0, double t0, double sumFlow, double shearFlow)
    {
        double l = 0, least = 0, most = double.PositiveInfinity;
        for (int i = 0; i < MostIterations; i++)
        {
            double fa = 1 / (1 + l * sumFlow), fd = 1 / (1 + l * shearFlow);
            double a = fa * a0, d = fd * d0, t = fd * t0, q = Size(a, d, t);
            (double table, double slope) = point.Curve.At(point.Before + l * q);
            double value = q - point.Share * table;
            if (value == 0)
                return l;
            if (value > 0)
                least = l;
            else
                most = l;
            double byGrowth = -(0.25 * sumFlow * fa * a * a + shearFlow * fd * (0.75 * d * d + 3 * t * t)) / q;
            double next = l - value / (byGrowth - point.Share * slope * (q + l * byGrowth));
            if (!(next > least && next < most))
                next = double.IsPositiveInfinity(most) ? 2 * l : 0.5 * (least + most);
            // A step or an interval of a few last digits changes nothing more.
            if (Math.Abs(next - l) <= 2e-16 * l || next == least || next == most)
                return next;
            l = next;
        }
        return l;
    }

    private static double Size(double sum, double difference, double shear) => Math.Sqrt(0.25 * sum * sum + 0.75 * difference * difference + 3 * shear * shear);

    private static void Put(double sum, double difference, double shear, Span<double> stress)
    {
        stress[0] = 0.5 * (sum + difference);
        stress[1] = 0.5 * (sum - difference);
        stress[3] = shear;
    }
}
