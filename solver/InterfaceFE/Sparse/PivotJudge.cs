namespace InterfaceFE.Sparse;

/// <summary>
/// Decides on each pivot: sound, numerically zero (no larger than the round-off of its own forming), or small and harmful (its column would grow by more than 1e7). The
/// last two are lifted, sign kept, which refinement of the solves makes good. Small pivots that do no harm, as a slender part's last ones, stay.
/// </summary>
internal static class PivotJudge
{
    /// <summary>Share of an unknown's scale below which a pivot is numerically zero in any case.</summary>
    public const double ZeroShare = 1e-15;

    /// <summary>Factor on the round-off estimate below which a pivot is numerically zero.</summary>
    public const double NoiseFactor = 128;

    /// <summary>
    /// Share of an unknown's soft scale below which a pivot is looked at closely. A look costs a substitution through the upper part of the front's subtree; rigid turning of
    /// a long part leaves up to 1e-5 of round-off (measured: 2000×4 elements, floating), and a clamped strip's last pivots reach the same size when it is 30 times as long as high.
    /// </summary>
    public const double SmallShare = 1e-4;

    /// <summary>The same for the scaled pivots of the root.</summary>
    public const double SmallRootShare = 1e-6;

    /// <summary>
    /// Share of an unknown's soft scale to which a pivot is lifted. Measured on 12,000 random matrices with many exact zeros: with 1e-8 the refined solves of 5 kept a backward
    /// error above 1e-12, with 1e-6 one.
    /// </summary>
    public const double LiftShare = 1e-6;

    /// <summary>Growth above which a small pivot is lifted.</summary>
    public const double HarmfulGrowth = 1e7;

    /// <summary>Unit round-off.</summary>
    public const double RoundOff = 1.1102230246251565e-16;

    /// <summary>Whether a pivot needs a look at its column before it is taken.</summary>
    public static bool IsSmall(double pivot, double softScale) => !(Math.Abs(pivot) >= SmallShare * softScale);

    /// <summary>Counts a finite pivot and returns the value to use.</summary>
    /// <param name="tally">Counts.</param>
    /// <param name="place">Its place in the elimination order.</param>
    /// <param name="pivot">As computed.</param>
    /// <param name="scale">Scale of its unknown, above zero.</param>
    /// <param name="softScale">Scale of its unknown without layers, above zero.</param>
    /// <param name="noise">Round-off that its forming may have left in it; needed for small pivots only.</param>
    /// <param name="growth">Growth its column would cause; needed for small pivots only.</param>
    public static double Take(ref PivotTally tally, int place, double pivot, double scale, double softScale, double noise, double growth)
    {
        double size = Math.Abs(pivot), zero = Math.Max(ZeroShare * scale, NoiseFactor * noise);
        tally.SmallestRatio = Math.Min(tally.SmallestRatio, size / scale);
        double lifted = Math.Max(LiftShare * softScale, zero);
        if (size <= zero)
        {
            tally.Zero++;
            tally.FirstZero = tally.FirstZero < 0 ? place : tally.FirstZero;
            return pivot < 0 ? -lifted : lifted;
        }
        if (pivot > 0)
            tally.Positive++;
        else
            tally.Negative++;
        if (size >= lifted || growth <= HarmfulGrowth)
            return pivot;
        tally.Harmful++;
        return pivot < 0 ? -lifted : lifted;
    }
}
