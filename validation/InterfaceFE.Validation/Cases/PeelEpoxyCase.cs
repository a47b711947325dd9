using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Peel coupon of epoxy between steel arms on the default mesh: compliance before damage against exact elasticity with the layer as springs, growth over 20 mm against the toughness put in.</summary>
public sealed class PeelEpoxyCase : ICase
{
    private const double WantedGrowth = 20;

    /// <inheritdoc/>
    public string Name => "peel-epoxy";

    /// <inheritdoc/>
    public string Group => "Peel";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        PeelCoupon coupon = PeelCoupon.Epoxy;
        RunResult run = context.Run("double cantilever beam, epoxy", coupon.Deck(1.7));
        int grip = run.History.Grips.ToList().FindIndex(g => g.Name == "upper end");
        var root = new PeelElasticRoot(coupon.Young, coupon.Height, coupon.LayerStiffness);
        PointRow first = run.History.Points[1];
        double compliance = first.Grips[grip].Displacement / first.Grips[grip].Force;
        const string Root = "derived, exact elasticity of arms on springs (Wiener and Hopf): C = 2[(a + Δ)³/3 - p]/(bD), here Δ = ";
        yield return new CaseLine("compliance before damage, exact elasticity", root.Compliance(coupon.Crack, coupon.Width), compliance, 0.01, "mm/N", $"{Root}{root.RootLength:0.000} mm");
        double corrected = BeamCorrection(coupon);
        yield return new CaseLine("the same, corrected beam theory", 8 * Math.Pow(coupon.Crack + corrected, 3) / (coupon.Young * coupon.Width * Math.Pow(coupon.Height, 3)), compliance, 0.01, "mm/N",
            $"C = 8(a + Δ)³/(Ebh³), Timoshenko beam on springs (derived): Δ² = D/(κGh) + 2√(D/2k), κ = 5/6, Δ = {corrected:0.000} mm; counts the shear of the arms and the layer, not their give across");
        yield return new CaseLine("share of mode II at the front while it grows", 0, LargestSlidingShare(run), 1e-6, "", "symmetry: none");

        PeelReading[] readings = PeelReduction.WhileGrowing(run);
        yield return CaseLine.AtMost("growth missing to 20 mm", 0, WantedGrowth - (readings[^1].Crack - coupon.Crack), "mm", "the growth that is asked of the run");
        double correction = PeelReduction.FittedCorrection(readings), exponent = PeelReduction.FittedExponent(readings);
        const string Iso = "toughness put in; ISO 25217:2009 (from memory), crack tip at damage 1 as front.csv has it";
        foreach (CaseLine line in Lines("corrected beam theory, fitted correction", coupon.Toughness, [.. readings.Select(r => PeelReduction.CorrectedBeam(r, correction, coupon.Width))], Iso))
            yield return line;
        foreach (CaseLine line in Lines("effective crack", coupon.Toughness, [.. readings.Select(r => PeelReduction.EffectiveCrack(r, coupon.Young, coupon.Height, coupon.Width))],
            "toughness put in; a_e = (Ebh³C/8)^(1/3), G = 12P²a_e²/(Eb²h³), common practice"))
            yield return line;
        yield return CaseLine.Reported("experimental compliance, mean over the growth", readings.Average(r => PeelReduction.ExperimentalCompliance(r, exponent, coupon.Width)), "N/mm", Iso, coupon.Toughness);
        yield return CaseLine.Reported("fitted correction, beside that of the elastic root", correction, "mm", "fit of C^(1/3) against a; the process zone is part of it", root.RootLength);
        yield return CaseLine.Reported("peak force", run.Summary.Grips[grip].PeakForce!.Value, "N", "from J = P²(a + Δ)²/(b²D) of the elastic root at the starter tip: zone of no length",
            coupon.Width * Math.Sqrt(coupon.Toughness * coupon.Young * Math.Pow(coupon.Height, 3) / 12) / (coupon.Crack + root.RootLength));
        context.Draw(new CaseFigure("peel-epoxy-toughness", "Toughness from the run's own record", "double cantilever beam, epoxy on steel", "crack length [mm]", "G [N/mm]",
        [
            new CaseCurve("corrected beam theory, fitted", [.. readings.Select(r => r.Crack)], [.. readings.Select(r => PeelReduction.CorrectedBeam(r, correction, coupon.Width))], true),
            new CaseCurve("effective crack", [.. readings.Select(r => r.Crack)], [.. readings.Select(r => PeelReduction.EffectiveCrack(r, coupon.Young, coupon.Height, coupon.Width))], true),
            new CaseCurve("put in", [readings[0].Crack, readings[^1].Crack], [coupon.Toughness, coupon.Toughness]),
        ]));
    }

    private static IEnumerable<CaseLine> Lines(string how, double toughness, double[] values, string source)
    {
        yield return new CaseLine(how + ", mean over the growth", toughness, values.Average(), 0.015, "N/mm", source);
        yield return new CaseLine(how + ", farthest value", toughness, values.MaxBy(v => Math.Abs(v - toughness)), 0.015, "N/mm", source);
    }

    private static double LargestSlidingShare(RunResult run) => run.History.Fronts.Where(f => f is { Front: 1, ModeMixDegrees: not null }).Max(f => Math.Pow(Math.Sin(f.ModeMixDegrees!.Value * Math.PI / 180), 2));

    /// <summary>Timoshenko beam on the layer's springs, 2k per arm: Δ² = D/(κGh) + 2√(D/2k), κ = 5/6.</summary>
    private static double BeamCorrection(PeelCoupon coupon)
    {
        double rigidity = coupon.Young * Math.Pow(coupon.Height, 3) / 12, shear = 5.0 / 6 * coupon.Young / 2.6 * coupon.Height;
        return Math.Sqrt(rigidity / shear + 2 * Math.Sqrt(rigidity / (2 * coupon.LayerStiffness)));
    }
}
