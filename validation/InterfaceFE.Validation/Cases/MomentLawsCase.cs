using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Steady moment of a double cantilever beam turned by equal and opposite couples, one run for each way to write a layer that the other moment coupons do not use. The steady moment is
/// exact for any law, so a law that spends more or less than its toughness in a whole joint shows at once.
/// </summary>
public sealed class MomentLawsCase : ICase
{
    private const string Source = "computed from M² = b·B·(E'h³/12)·toughness; formula of Suo, Bao and Fan, J. Mech. Phys. Solids 40 (1992) 1-16, from memory";

    /// <inheritdoc/>
    public string Name => "moment-laws";

    /// <inheritdoc/>
    public string Group => "Moment coupons";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        var coupon = new MomentCoupon { Young = 210_000, Thickness = 6, Length = 110, Crack = 30, Layer = "", Fix = "{lower: [x, y]}", Turn = "{grips: {upper: -1, lower: 1}, angle: 2.2 deg}" };
        (string Name, double Toughness, string Layer)[] laws =
        [
            ("linear-parabolic with a plastic share", 0.6, """
                thickness: 0.25 mm
                peel: {law: linear-parabolic, stiffness: 12000 MPa/mm, strength: 38 MPa, toughness: 0.6 kJ/m^2, plastic share: 0.4}
                shear: {law: linear-parabolic, stiffness: 4000 MPa/mm, strength: 30 MPa, toughness: 1.5 kJ/m^2}
                mixing: independent modes
                """),
            ("power law", 0.6, """
                thickness: 0.25 mm
                peel: {law: bilinear, stiffness: 12000 MPa/mm, strength: 38 MPa, toughness: 0.6 kJ/m^2}
                shear: {law: bilinear, stiffness: 4000 MPa/mm, strength: 30 MPa, toughness: 1.5 kJ/m^2}
                mixing: power law
                exponent: 1.4
                """),
            ("coupled potential", 0.6, """
                thickness: 0.25 mm
                peel: {law: potential, strength: 38 MPa, toughness: 0.6 kJ/m^2, exponent: 3, initial slope: 0.05}
                shear: {law: potential, strength: 30 MPa, toughness: 1.5 kJ/m^2, exponent: 2.5, initial slope: 0.05}
                mixing: coupled potential
                """),
        ];
        foreach ((string name, double toughness, string layer) in laws)
        {
            MomentCoupon made = coupon with { Layer = layer };
            RunResult run = context.Run("moment coupon, " + name, made.Deck());
            IReadOnlyList<MomentPoint> growth = made.Growth(run.History), plateau = made.Plateau(growth, 24, 0);
            if (plateau.Count < 3)
            {
                yield return CaseLine.Broken(name + ": no steady growth", $"{run.Summary.Status}: {run.Summary.Cause}; growth {growth[^1].Growth:G4} mm, zone {growth[^1].Front.ProcessZone:G4} mm");
                continue;
            }
            double steady = Math.Sqrt(made.LayerWidth * made.ArmWidth * made.PlaneModulus * Math.Pow(made.Thickness, 3) * toughness / 12);
            yield return new CaseLine(name + ": steady moment", steady, plateau.Average(p => p.Lower), 1e-3, "N·mm", Source);
            foreach (CaseLine line in SelfCheck.Lines(name, run))
                yield return line;
        }
    }
}
