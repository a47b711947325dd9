using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Peel coupon of Alfano and Crisfield at a strength of 57 MPa on the default mesh: peak against linear-elastic fracture mechanics.</summary>
public sealed class PeelAlfanoCrisfieldCase : ICase
{
    /// <inheritdoc/>
    public string Name => "peel-alfano-crisfield";

    /// <inheritdoc/>
    public string Group => "Peel";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        PeelCoupon coupon = PeelCoupon.AlfanoCrisfield;
        const string Data = "data of Alfano and Crisfield, Int. J. Numer. Meth. Eng. 50 (2001) 1701-1736, Table I (from memory)";
        RunResult run = context.Run("double cantilever beam, 57 MPa", coupon.Deck(3));
        double peak = run.Summary.Grips[0].PeakForce!.Value, at = run.Summary.Grips[0].DisplacementAtPeak!.Value;
        yield return new CaseLine("peak force at 57 MPa", 63.15, peak, 0.03, "N", "computed from the cited formula: linear-elastic fracture mechanics, G = 12P²(a + Yh)²/(E'b²h³), Y of Suo, Bao, Fan and Wang, Int. J. Solids Struct. 28 (1991); " + Data);
        yield return CaseLine.Reported("peak force, beside the published one", peak, "N", "61.5 N, read off a figure of the paper (from memory)", 61.5);
        yield return CaseLine.Reported("opening at the peak, beside linear-elastic fracture mechanics", at, "mm", "computed from the cited formula", 1.936);
        PeelReading[] readings = PeelReduction.WhileGrowing(run);
        double[] effective = [.. readings.Select(r => PeelReduction.EffectiveCrack(r, coupon.Young, coupon.Height, coupon.Width))];
        yield return new CaseLine("toughness by the effective crack, mean over the growth", coupon.Toughness, effective.Average(), 0.015, "N/mm", "toughness put in; a_e = (Ebh³C/8)^(1/3), G = 12P²a_e²/(Eb²h³), common practice");
        MeshCurve curve = MeshCurve.Of(run, "upper end");
        double[] cracks = [.. Enumerable.Range(0, 60).Select(i => 30.0 + 0.25 * i)];
        context.Draw(new CaseFigure("peel-alfano-crisfield", "Peel coupon at a strength of 57 MPa", Data, "opening [mm]", "force [N]",
        [
            new CaseCurve("run", curve.Displacement, curve.Force, true),
            new CaseCurve("growth, simple beam", [.. cracks.Select(a => Opening(coupon, a))], [.. cracks.Select(a => Force(coupon, a))]),
        ]));
    }

    private static double Force(PeelCoupon c, double crack) => c.Width * Math.Pow(c.Height, 1.5) / crack * Math.Sqrt(c.Young * c.Toughness / 12);

    private static double Opening(PeelCoupon c, double crack) => 2 * crack * crack / Math.Pow(c.Height, 1.5) * Math.Sqrt(4 * c.Toughness / (3 * c.Young));
}
