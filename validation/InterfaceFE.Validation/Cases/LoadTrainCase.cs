using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Peel coupon behind a compliant load train. Growth at even toughness has P·a constant and C as a³, so that the crosshead's travel P·(C + Cm) falls while Cm > 2C: the crack runs on until the specimen's
/// compliance has come to half of the load train's, and is stable from there. Without a load train it is stable throughout.
/// </summary>
public sealed class LoadTrainCase : ICase
{
    private const double Share = 2.2;
    private const string Series = "derived: springs in series";
    private const string Limit = "derived: P·(a + χh) constant and C as (a + χh)³ in growth at even toughness give d[P·(C + Cm)]/da = P·(2C - Cm)/(a + χh); stability judged with the machine's compliance, common practice";

    /// <inheritdoc/>
    public string Name => "load-train";

    /// <inheritdoc/>
    public string Group => "Peel";

    /// <inheritdoc/>
    public bool Quick => false;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        // A lower strength than the paper's: a longer process zone needs fewer elements, and the statements hold for any zone that moves along unchanged.
        PeelCoupon coupon = PeelCoupon.AlfanoCrisfield with { Strength = 25 };
        RunResult stiff = context.Run("no load train", coupon.Deck(3));
        GripReading first = stiff.History.Points[1].Grips[0];
        double virgin = first.Displacement / first.Force, train = 2 * Share * virgin;
        RunResult soft = context.Run("load train of 4.4 times the coupon's compliance", coupon.Deck(12, loadTrain: 1 / train));
        PointRow[] points = [.. soft.History.Points];
        double[] force = [.. points.Select(p => p.Grips[0].Force)], travel = [.. points.Select(p => p.Grips[0].Crosshead!.Value)];
        double worst = points.Select((p, i) => Math.Abs(p.Grips[0].Displacement + force[i] * train - travel[i])).Max() / travel.Max();
        yield return CaseLine.AtMost("crosshead against grip and spring in series, worst point over the travel", 1e-9, worst, "", Series);
        yield return new CaseLine("peak force, against no load train", stiff.Summary.Grips[0].PeakForce!.Value, soft.Summary.Grips[0].PeakForce!.Value, 2e-3, "N", "a load train alters travel and stability, not the force at which the crack grows");
        yield return CaseLine.AtMost("unstable points without load train", 0, stiff.History.Points.Count(p => !p.Stable), "", Limit);
        // A bump of force as the tip passes an element outweighs the slope of the branch near its turning point; away from it the count must say what the branch says.
        (int Stable, int All) running = Count(points, train, 0.3, 0.4), resting = Count(points, train, 0.7, double.PositiveInfinity);
        yield return CaseLine.AtMost("share of stable points where the coupon's compliance is 0.3 to 0.4 of the load train's (most are to be unstable)", 0.5, running.Stable / (double)running.All, "", Limit);
        yield return CaseLine.AtMost("share of unstable points where it is above 0.7 (most are to be stable)", 0.5, 1 - resting.Stable / (double)resting.All, "", Limit);
        int last = Array.FindLastIndex(points, p => !p.Stable);
        yield return CaseLine.Reported("compliance of the coupon at the last unstable point, over that of the load train", last < 0 ? double.NaN : Compliance(points[last]) / train, "", Limit, 0.5);
        double branch = points.Where(p => p.Grips[0].Force > 0 && Compliance(p) is var c && c > 0.3 * train).Max(p => Math.Abs(p.Grips[0].Crosshead!.Value / Travel(coupon, Compliance(p), train) - 1));
        yield return CaseLine.AtMost("travel of the crosshead along the branch, through its turn, against P(C)·(C + Cm): worst point", 0.02, branch, "",
            "derived: C = 8a³/(Ebh³) and Γ = 12P²a²/(Eb²h³) with the effective crack a (E for E', 0.4 % apart), so that P³C is constant");
        foreach (CaseLine line in SelfCheck.Lines("load train", soft))
            yield return line;
        MeshCurve bare = MeshCurve.Of(stiff, "upper end");
        context.Draw(new CaseFigure("load-train", "Peel coupon behind a compliant load train", "data of Alfano and Crisfield 2001 (from memory)", "travel of the crosshead [mm]", "force [N]",
            [new CaseCurve("no load train", bare.Displacement, bare.Force), new CaseCurve("load train of 4.4 times the coupon's compliance", travel, force)]));
    }

    private static double Compliance(PointRow point) => point.Grips[0].Displacement / point.Grips[0].Force;

    private static (int Stable, int All) Count(PointRow[] points, double train, double from, double to)
    {
        PointRow[] between = [.. points.Where(p => p.Grips[0].Force > 0 && Compliance(p) > from * train && Compliance(p) < to * train)];
        return (between.Count(p => p.Stable), between.Length);
    }

    private static double Travel(PeelCoupon c, double compliance, double train)
    {
        double h3 = c.Height * c.Height * c.Height;
        double force = Math.Cbrt(Math.Pow(c.Toughness * c.Young * c.Width * c.Width * h3 / 12, 1.5) * 8 / (c.Young * c.Width * h3) / compliance);
        return force * (compliance + train);
    }
}
