using InterfaceFE.Results;
using InterfaceFE.Runs;

namespace InterfaceFE.Validation.Cases;

/// <summary>A record of force, opening and crack length taken from a run.</summary>
/// <param name="Crack">Crack length a [mm].</param>
/// <param name="Force">Force P [N].</param>
/// <param name="Opening">Opening δ at the pins [mm].</param>
public readonly record struct PeelReading(double Crack, double Force, double Opening)
{
    /// <summary>δ/P [mm/N].</summary>
    public double Compliance => Opening / Force;
}

/// <summary>Toughness of a peel coupon from force, opening and crack length, by the formulas of ISO 25217:2009 (from memory); the large-displacement factor is 1 in a run of small rotation.</summary>
public static class PeelReduction
{
    /// <summary>
    /// Readings of a run while the crack grows: the crack tip is where front.csv has it, damage 1, and counts once it has left the starter tip. The load line is at x = 0, where the joint starts.
    /// </summary>
    public static PeelReading[] WhileGrowing(RunResult run)
    {
        ArgumentNullException.ThrowIfNull(run);
        int grip = run.History.Grips.ToList().FindIndex(g => g.Name == "upper end");
        double starter = run.History.Fronts.First(f => f.Front == 1).CrackTip!.Value;
        return
        [
            .. run.History.Fronts.Where(f => f.Front == 1 && f.CrackTip > starter)
                .Select(f => new PeelReading(f.CrackTip!.Value, run.History.Points[f.Point].Grips[grip].Force, run.History.Points[f.Point].Grips[grip].Displacement)),
        ];
    }

    /// <summary>Correction |Δ| of corrected beam theory [mm]: the straight line through C^(1/3) against a, by least squares, meets C = 0 at a = -|Δ|.</summary>
    public static double FittedCorrection(IReadOnlyList<PeelReading> readings)
    {
        (double slope, double intercept) = Line([.. readings.Select(r => r.Crack)], [.. readings.Select(r => Math.Cbrt(r.Compliance))]);
        return intercept / slope;
    }

    /// <summary>Exponent n of C = const·aⁿ, by least squares in the logarithms.</summary>
    public static double FittedExponent(IReadOnlyList<PeelReading> readings) =>
        Line([.. readings.Select(r => Math.Log(r.Crack))], [.. readings.Select(r => Math.Log(r.Compliance))]).Slope;

    /// <summary>Corrected beam theory, G = 3Pδ/(2b(a + |Δ|)) [N/mm].</summary>
    public static double CorrectedBeam(PeelReading reading, double correction, double width) => 3 * reading.Force * reading.Opening / (2 * width * (reading.Crack + correction));

    /// <summary>Experimental compliance, G = nPδ/(2ba) [N/mm].</summary>
    public static double ExperimentalCompliance(PeelReading reading, double exponent, double width) => exponent * reading.Force * reading.Opening / (2 * width * reading.Crack);

    /// <summary>Effective crack: the length a_e = (Ebh³C/8)^(1/3) that a simple beam of the known modulus would need, G = 12P²a_e²/(Eb²h³) [N/mm]. Needs no crack length.</summary>
    public static double EffectiveCrack(PeelReading reading, double modulus, double height, double width)
    {
        double cubed = height * height * height, length = Math.Cbrt(modulus * width * cubed * reading.Compliance / 8);
        return 12 * reading.Force * reading.Force * length * length / (modulus * width * width * cubed);
    }

    private static (double Slope, double Intercept) Line(double[] x, double[] y)
    {
        double meanX = x.Average(), meanY = y.Average(), sxx = 0, sxy = 0;
        for (int i = 0; i < x.Length; i++)
        {
            sxx += (x[i] - meanX) * (x[i] - meanX);
            sxy += (x[i] - meanX) * (y[i] - meanY);
        }
        return (sxy / sxx, meanY - sxy / sxx * meanX);
    }
}
