using System.Globalization;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Uneven couples on the arms with independent modes and the energy criterion of Yang and Thouless 2001. In steady growth J of the couples is the energy that a point of the
/// layer has taken up when it separates; there G_I/Γ_I + G_II/Γ_II = 1, so with the split G_I : G_II of the point itself the steady moment is known, however long the release.
/// </summary>
public sealed class MomentUnevenCase : ICase
{
    private const string Source = "computed: G_I/Γ_I + G_II/Γ_II = 1 (Yang and Thouless 2001) with the run's own split; J = [21(M1² + M2²) - 6·M1·M2]/(4E'h³b²), "
        + "formula as Sørensen et al., Int. J. Fract. 141 (2006) 163-176, from memory";

    /// <inheritdoc/>
    public string Name => "moment-uneven";

    /// <inheritdoc/>
    public string Group => "Moment coupons";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        (string Toughness, double Peel, double Shear, double[] Shares)[] variants = context.Quick
            ? [("unequal toughness", 0.6, 1.8, [-0.5]), ("equal toughness", 1, 1, [0.2])]
            : [("unequal toughness", 0.6, 1.8, [0.6, 0.2, -0.2, -0.5, -0.8]), ("equal toughness", 1, 1, [0.2, -0.5])];
        double[] lengths = context.Quick ? [0.05] : [0.1, 0.05, 0.02];
        List<(double Length, double Share, double J)> found = [];
        foreach ((string toughness, double peel, double shear, double[] shares) in variants)
        {
            foreach (double share in shares)
            {
                foreach (double length in lengths)
                {
                    string name = string.Create(CultureInfo.InvariantCulture, $"{toughness}, lower couple {share:0.0} of the upper, release {length:0.00}");
                    var coupon = new MomentCoupon
                    {
                        Length = 170,
                        // The program's own choice resolves the release stretch; the couples are the same to 0.01 % on elements of 1 mm, at a tenth of the cost.
                        ElementLength = 1,
                        Layer = Layer(peel, shear, length),
                        Fix = "{root: [x, y, rotation]}",
                        Turn = string.Create(CultureInfo.InvariantCulture, $"{{grips: {{upper: -1, lower: {share}}}, moment: 60000 N*mm}}"),
                        // The split of a point is summed over the strides that take it through the zone: fine ones. The couples themselves do not need them.
                        More = "march: {path error: 3e-5, most points: 600}",
                    };
                    RunResult run = context.Run(name, coupon.Deck());
                    IReadOnlyList<MomentPoint> growth = coupon.Growth(run.History), plateau = coupon.Plateau(growth, 45, 15);
                    if (plateau.Count < 3)
                    {
                        yield return CaseLine.Broken(name + ": no steady growth", $"{run.Summary.Status}: {run.Summary.Cause}; growth {(growth.Count > 0 ? growth[^1].Growth : 0):G4} mm");
                        continue;
                    }
                    double[] j = [.. plateau.Select(p => coupon.EnergyReleaseRate(p.Upper, p.Lower))];
                    double mix = plateau.Average(p => p.Front.ModeMixDegrees ?? double.NaN) * Math.PI / 180, shearShare = Math.Sin(mix) * Math.Sin(mix);
                    double expected = 1 / ((1 - shearShare) / peel + shearShare / shear);
                    yield return new CaseLine(name + ": J of the couples", expected, j.Average(), 1e-3, "N/mm", Source);
                    yield return CaseLine.Reported(name + ": spread of J over the plateau, share of its mean", (j.Max() - j.Min()) / j.Average(), "", "ripple of the mesh; not judged");
                    yield return CaseLine.Reported(name + ": share of G_II", shearShare, "", "split of the point that separates, from the run");
                    yield return SelfCheck.Balance(name, run);
                    yield return SelfCheck.PathError(name, run);
                    yield return CaseLine.Reported($"{name}: {SelfCheck.Words(run.Summary)}; growth", growth[^1].Growth, "mm", "after the plateau the bond may end in any way");
                    if (peel != shear)
                        found.Add((length, shearShare, j.Average()));
                }
            }
        }
        double[] line = [.. Enumerable.Range(0, 51).Select(i => i / 50.0)];
        context.Draw(new CaseFigure("moment-uneven", "J of uneven couples in steady growth", "independent modes, toughness 0.6 N/mm in peel and 1.8 N/mm in shear", "share of G_II (-)", "J (N/mm)",
        [
            new CaseCurve("criterion", line, [.. line.Select(x => 1 / ((1 - x) / 0.6 + x / 1.8))]),
            .. found.GroupBy(f => f.Length).Select(g => new CaseCurve(string.Create(CultureInfo.InvariantCulture, $"release length {g.Key:0.00}"),
                [.. g.OrderBy(f => f.Share).Select(f => f.Share)], [.. g.OrderBy(f => f.Share).Select(f => f.J)], Points: true)),
        ]));
    }

    private static string Layer(double peel, double shear, double release) => string.Create(CultureInfo.InvariantCulture, $$"""
        thickness: 0.2 mm
        peel: {law: bilinear, stiffness: 3300 MPa/mm, strength: 20 MPa, toughness: {{peel}} kJ/m^2}
        shear: {law: bilinear, stiffness: 1800 MPa/mm, strength: 25 MPa, toughness: {{shear}} kJ/m^2}
        mixing: independent modes
        release length: {{release}}
        """);
}
