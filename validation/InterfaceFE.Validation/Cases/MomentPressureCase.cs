using System.Globalization;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Validation.Framework;

namespace InterfaceFE.Validation.Cases;

/// <summary>
/// Steady moment of a double cantilever beam with a soft tape at three ambient pressures: a pressure other than that of the test adds to the peel curve where cavities are not vented, and the
/// steady moment must follow M² = b·B·(E'h³/12)·(toughness + dp·∫share dw).
/// </summary>
public sealed class MomentPressureCase : ICase
{
    private const double Toughness = 2, Measured = 0.1013;

    // Integral of the share: 0.6·(0.5/2 + 2 + 0.8/2).
    private const double Cavities = 0.6 * (0.25 + 2 + 0.4);

    private const string Tape = """
        thickness: 1.1 mm
        peel: {law: trapezoid, stiffness: 2.5 MPa/mm, strength: 0.5 MPa, toughness: 2.0 kJ/m^2, plateau until: 3.2 mm}
        shear: {law: trapezoid, stiffness: 0.9 MPa/mm, strength: 0.45 MPa, toughness: 2.2 kJ/m^2, plateau until: 4.0 mm}
        mixing: independent modes
        cavities: {opening: [0.3 mm, 0.8 mm, 2.8 mm, 3.6 mm], share: [0, 0.6, 0.6, 0]}
        measured at: {pressure: 1.013 bar}
        """;

    /// <inheritdoc/>
    public string Name => "moment-pressure";

    /// <inheritdoc/>
    public string Group => "Moment coupons";

    /// <inheritdoc/>
    public bool Quick => true;

    /// <inheritdoc/>
    public IEnumerable<CaseLine> Run(CaseContext context)
    {
        var coupon = new MomentCoupon { Thickness = 3, Length = 260, Crack = 20, Layer = Tape, Fix = "{lower: [x, y]}", Turn = "{grips: {upper: -1, lower: 1}, angle: 40 deg}" };
        foreach (double pressure in (double[])[0.02, Measured, 0.25])
        {
            string name = string.Create(CultureInfo.InvariantCulture, $"ambient pressure {10 * pressure:0.###} bar");
            MomentCoupon made = coupon with { ModelKeys = string.Create(CultureInfo.InvariantCulture, $", ambient pressure: {pressure} MPa") };
            RunResult run = context.Run("moment coupon, " + name, made.Deck());
            IReadOnlyList<MomentPoint> growth = made.Growth(run.History), plateau = made.Plateau(growth, 90, 0);
            if (plateau.Count < 3)
            {
                yield return CaseLine.Broken(name + ": no steady growth", $"{run.Summary.Status}: {run.Summary.Cause}; growth {growth[^1].Growth:G4} mm, zone {growth[^1].Front.ProcessZone:G4} mm");
                continue;
            }
            double steady = Math.Sqrt(made.LayerWidth * made.ArmWidth * made.PlaneModulus * Math.Pow(made.Thickness, 3) * (Toughness + (pressure - Measured) * Cavities) / 12);
            yield return new CaseLine(name + ": steady moment", steady, plateau.Average(p => p.Lower), 1e-3, "N·mm",
                "computed from M² = b·B·(E'h³/12)·(toughness + dp·∫share dw), the integral by hand; J of the moment coupon: Suo, Bao and Fan 1992, from memory");
            foreach (CaseLine line in SelfCheck.Lines(name, run))
                yield return line;
        }
    }
}
