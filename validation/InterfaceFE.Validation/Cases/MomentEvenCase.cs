using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>Steady moment of a double cantilever beam turned by equal and opposite couples: exact for any law, since J does not depend on the crack length.</summary>
public sealed class MomentEvenCase : ICase
{
    private const string Source = "computed from J = 12M²/(b·B·E'h³); formula of Suo, Bao and Fan, J. Mech. Phys. Solids 40 (1992) 1-16, from memory";
    private const string Epoxy = """
        thickness: 0.25 mm
        peel: {law: bilinear, stiffness: 12000 MPa/mm, strength: 38 MPa, toughness: 0.6 kJ/m^2}
        shear: {law: bilinear, stiffness: 4000 MPa/mm, strength: 30 MPa, toughness: 1.5 kJ/m^2}
        mixing: benzeggagh-kenane
        exponent: 2.0
        """;

    private const string Tape = """
        thickness: 1.1 mm
        peel: {law: trapezoid, stiffness: 2.5 MPa/mm, strength: 0.5 MPa, toughness: 2.0 kJ/m^2, plateau until: 3.2 mm}
        shear: {law: trapezoid, stiffness: 0.9 MPa/mm, strength: 0.45 MPa, toughness: 2.2 kJ/m^2, plateau until: 4.0 mm}
        mixing: independent modes
        """;

    /// <inheritdoc/>
    public string Name => "moment-even";

    /// <inheritdoc/>
    public string Group => "Moment coupons";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        const string Turn = "{grips: {upper: -1, lower: 1}, angle: ", Fix = "{lower: [x, y]}";
        var epoxy = new MomentCoupon { Young = 210_000, Thickness = 6, Length = 110, Crack = 30, Layer = Epoxy, Fix = Fix, Turn = Turn + "2.2 deg}" };
        var tape = new MomentCoupon { Thickness = 3, Length = 260, Crack = 20, Layer = Tape, Fix = Fix, Turn = Turn + "40 deg}" };
        (string Name, double Toughness, double Clear, MomentCoupon Coupon)[] variants =
        [
            ("epoxy, free", 0.6, 24, epoxy),
            ("epoxy, held", 0.6, 24, epoxy with { Held = true }),
            ("epoxy, layer of 15 mm on arms of 25 mm", 0.6, 24, epoxy with { LayerWidth = 15 }),
            ("soft tape, free", 2.0, 90, tape),
            ("soft tape, held", 2.0, 90, tape with { Held = true }),
        ];
        List<CaseCurve> curves = [];
        foreach ((string name, double toughness, double clear, MomentCoupon coupon) in variants)
        {
            RunResult run = context.Run("moment coupon, " + name, coupon.Deck());
            IReadOnlyList<MomentPoint> growth = coupon.Growth(run.History), plateau = coupon.Plateau(growth, clear, 0);
            double steady = Math.Sqrt(coupon.LayerWidth * coupon.ArmWidth * coupon.PlaneModulus * Math.Pow(coupon.Thickness, 3) * toughness / 12);
            curves.Add(new CaseCurve(name, [.. growth.Select(g => g.Growth)], [.. growth.Select(g => g.Lower / steady)], Points: true));
            if (plateau.Count < 3)
            {
                yield return CaseLine.Broken(name + ": no steady growth", $"{run.Summary.Status}: {run.Summary.Cause}; growth {growth[^1].Growth:G4} mm, zone {growth[^1].Front.ProcessZone:G4} mm");
                continue;
            }
            double mean = plateau.Average(p => p.Lower);
            yield return new CaseLine(name + ": steady moment", steady, mean, 1e-3, "N·mm", Source);
            yield return CaseLine.AtMost(name + ": spread of the moment over the plateau, share of its mean", 1e-3, (plateau.Max(p => p.Lower) - plateau.Min(p => p.Lower)) / mean, "",
                "steady growth: J does not depend on the crack length");
            yield return CaseLine.Reported($"{name}: growth on the plateau ({plateau.Count} points)", plateau[^1].Growth - plateau[0].Growth, "mm", "not compared");
            yield return new CaseLine(name + ": J path on the plateau", toughness, plateau.Average(p => p.Front.JPath) ?? double.NaN, 1e-2, "N/mm", "J of steady growth is the toughness; Rice 1968; points at which it has a value");
            yield return new CaseLine(name + ": J rotation on the plateau", toughness, plateau.Average(p => p.Front.JRotation ?? double.NaN), 1e-2, "N/mm", "J of steady growth is the toughness");
            foreach (CaseLine line in SelfCheck.Lines(name, run))
                yield return line;
        }
        context.Draw(new CaseFigure("moment-even", "Moment against crack growth", "equal and opposite couples; moment over the exact steady moment", "crack growth (mm)", "moment / steady moment (-)", curves));
    }
}
