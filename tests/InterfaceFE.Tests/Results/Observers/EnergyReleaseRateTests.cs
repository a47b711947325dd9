using InterfaceFE.Decks;
using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Results.Observers;

/// <summary>J by three ways on coupons with the mesh that the mesher chooses, and the reasons where a way does not hold.</summary>
public class EnergyReleaseRateTests
{
    private const string Epoxy = """
        {thickness: 0.25 mm, peel: {law: bilinear, stiffness: 12000 MPa/mm, strength: 38 MPa, toughness: 0.6 kJ/m^2},
            shear: {law: bilinear, stiffness: 4000 MPa/mm, strength: 30 MPa, toughness: 1.5 kJ/m^2}, mixing: benzeggagh-kenane, exponent: 2}
        """;

    private const string Tape = """
        {thickness: 1.1 mm, peel: {law: trapezoid, stiffness: 2 MPa/mm, strength: 0.5 MPa, toughness: 1.6 kJ/m^2},
            shear: {law: trapezoid, stiffness: 1.5 MPa/mm, strength: 0.45 MPa, toughness: 2 kJ/m^2}, mixing: independent modes}
        """;

    private const string EndGrips = "  up: {on: left end of upper}\n  down: {on: left end of lower}\n  far: {on: right end of lower}";
    private const string Turn = "  - fix: {far: [x, y, rotation]}\n  - turn: {grips: {up: -1, down: 1}, angle: 1.3 deg}";

    [Theory]
    [InlineData("free", false)]
    [InlineData("held", false)]
    [InlineData("free", true)]
    public void Moment_coupon_gives_the_closed_form_in_three_ways(string outOfPlane, bool tape)
    {
        // Source: 12·M²/(b²·E'·h³) for two equal arms of the layer's width, growing crack or not.
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon(EndGrips, tape ? Turn.Replace("1.3 deg", "3 deg", StringComparison.Ordinal) : Turn, outOfPlane, tape ? Tape : Epoxy, tape ? 400 : 120)));
        double young = outOfPlane == "held" ? 210e3 / (1 - 0.09) : 210e3;
        int compared = Compare(run, 1, 0.01, point => 12 * Math.Pow(point.Grips[1].Moment!.Value, 2) / (25 * 25 * young * 216), 0.01);
        Assert.True(compared > 8, $"{compared} points");
        Assert.True(run.Summary.SelfCheck.JDisagreement < 0.01);
        // The crack runs at the toughness.
        FrontRow last = run.History.Fronts.Last(f => f.Front == 1);
        if (!tape)
            Close.To(0.6, last.JUnderLaw!.Value, 1e-6);
        Assert.All(run.History.Fronts.Where(f => f.Front == 2), f => Assert.True(f.JPath is null && f.JRotation is null));
        Assert.Contains(run.Summary.Remarks, r => r.StartsWith("no J path at bond front 2", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("at: 10 mm", "at: 10 mm")]
    [InlineData("from: 0 mm, to: 12 mm", "from: 0 mm, to: 12 mm")]
    [InlineData("from: 0 mm, to: 12 mm, pin: [12 mm, 18 mm]", "from: 0 mm, to: 12 mm, pin: [12 mm, -6 mm]")]
    public void Peel_coupon_gives_one_value_in_three_ways(string upper, string lower)
    {
        string grips = $"  up: {{on: top of upper, {upper}}}\n  down: {{on: bottom of lower, {lower}}}";
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon(grips, "  - fix: {down: [x, y], up: [x]}\n  - pull: {grip: up, along: +y, travel: 0.7 mm}", "free", Epoxy, 120)));
        Assert.True(Compare(run, 1, 0.01, null, 0) > 8);
    }

    [Fact]
    public void Blocks_held_against_turning_give_one_value_too()
    {
        string grips = "  up: {on: top of upper, from: 0 mm, to: 12 mm}\n  down: {on: bottom of lower, from: 0 mm, to: 12 mm}";
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon(grips, "  - fix: {down: [x, y, rotation], up: [x, rotation]}\n  - pull: {grip: up, along: +y, travel: 0.4 mm}", "free", Epoxy, 120)));
        Assert.True(Compare(run, 1, 0.015, null, 0) > 8);
    }

    [Fact]
    public void A_crack_that_grows_to_the_left_has_the_same_rates()
    {
        string grips = "  up: {on: top of upper, at: 110 mm}\n  down: {on: bottom of lower, at: 110 mm}";
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon(grips, "  - fix: {down: [x, y], up: [x]}\n  - pull: {grip: up, along: +y, travel: 0.7 mm}", "free", Epoxy, 120).Replace("from: start", "from: end", StringComparison.Ordinal)));
        Assert.True(Compare(run, 2, 0.01, null, 0) > 8);
    }

    [Fact]
    public void After_a_change_of_temperature_two_ways_are_empty_and_the_summary_says_why()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon(EndGrips, "  - fix: {far: [x, y, rotation]}\n  - heat to: 25 °C", "free", Epoxy, 120)));
        FrontRow last = run.History.Fronts.Last(f => f.Front == 1);
        Assert.True(last.JRotation is null && last.JUnderLaw is null && last.JPath is not null);
        Assert.Contains(run.Summary.Remarks, r => r.Contains("temperature has changed", StringComparison.Ordinal));
    }

    [Fact]
    public void Two_joints_of_one_adherend_leave_both_formulas_empty()
    {
        string text = Coupon(EndGrips, Turn, "free", Epoxy, 120).Replace("joints:", "  third: {of: steel, rectangle: {corner: [0 mm, 12 mm], size: [120 mm, 6 mm]}}\njoints:\n  other: {layer: glue, upper: bottom of third, lower: top of upper, starter crack: {from: start, length: 40 mm}}", StringComparison.Ordinal);
        RunResult run = DeckOf.Run(DeckOf.Yaml(text.Replace("1.3 deg", "0.1 deg", StringComparison.Ordinal)));
        Assert.All(run.History.Fronts, f => Assert.True(f.JPath is null && f.JRotation is null));
        Assert.Contains(run.Summary.Remarks, r => r.Contains("another joint", StringComparison.Ordinal));
        Assert.Contains(run.Summary.Remarks, r => r.Contains("single joint", StringComparison.Ordinal));
    }

    [Fact]
    public void A_bent_adherend_leaves_both_formulas_empty()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml("""
            title: Bent sheet on a plate
            model: {width: 25 mm, out of plane: free, rotation: small}
            materials:
              steel: {young: 210 GPa, poisson: 0.3}
            layers:
              glue: {thickness: 1 mm, peel: {law: bilinear, stiffness: 2 MPa/mm, strength: 0.5 MPa, toughness: 1.6 kJ/m^2}, shear: {law: bilinear, stiffness: 2 MPa/mm, strength: 0.5 MPa, toughness: 1.6 kJ/m^2}, mixing: independent modes}
            adherends:
              plate: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [80 mm, 4 mm]}}
              sheet: {of: steel, sheet: {thickness: 2 mm, line: [[20 mm, 5 mm], [60 mm, 5 mm], [60 mm, 40 mm]], bend radius: 5 mm, stretches: {foot: 1}}}
            joints:
              bond: {layer: glue, upper: foot of sheet, lower: top of plate}
            grips:
              base: {on: bottom of plate}
              head: {on: right end of sheet}
            sequence:
              - fix: {base: [x, y, rotation]}
              - pull: {grip: head, along: +x, travel: 0.1 mm}
            """));
        Assert.All(run.History.Fronts, f => Assert.True(f.JPath is null && f.JRotation is null && f.JUnderLaw is not null));
        Assert.Contains(run.Summary.Remarks, r => r.Contains("bent", StringComparison.Ordinal));
    }

    [Fact]
    public void A_lap_has_no_arms_behind_its_fronts()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml(Coupon("  left: {on: left end of lower}\n  right: {on: right end of upper}", "  - fix: {left: [x, y, rotation], right: [y, rotation]}\n  - pull: {grip: right, along: +x, force: 100 N}", "free", Tape, 60)
            .Replace("upper: {of: steel, rectangle: {corner: [0 mm, 6 mm]", "upper: {of: steel, rectangle: {corner: [40 mm, 6 mm]", StringComparison.Ordinal).Replace(", starter crack: {from: start, length: 40 mm}", "", StringComparison.Ordinal)));
        Assert.All(run.History.Fronts, f => Assert.True(f.JPath is null && f.JRotation is null));
    }

    private static int Compare(RunResult run, int front, double tolerance, Func<PointRow, double>? closedForm, double closedTolerance)
    {
        Assert.True(run.Summary.Status == RunStatus.Finished, run.Summary.Cause);
        int compared = 0;
        double scale = run.History.Fronts.Max(f => f.JUnderLaw ?? 0);
        foreach (FrontRow row in run.History.Fronts.Where(f => f.Front == front))
        {
            if (row.JUnderLaw < 0.05 * scale)
                continue;
            compared++;
            string where = FormattableString.Invariant($"point {row.Point}, law {row.JUnderLaw}, path {row.JPath}, rotation {row.JRotation}, tip {row.CrackTip}: ");
            if (closedForm is not null)
                Close.To(closedForm(run.History.Points[row.Point]), row.JPath!.Value, closedTolerance, 0, where + "closed form");
            Close.To(row.JPath!.Value, row.JRotation!.Value, tolerance, 0, where + "rotation");
            // The work at the starter tip stays at the toughness once the crack has left it; the path then measures the moving front.
            Close.To(row.JPath!.Value, row.JUnderLaw!.Value, tolerance, 0, where + "law");
        }
        return compared;
    }

    private static string Coupon(string grips, string sequence, string outOfPlane, string layer, double length) => FormattableString.Invariant($$$"""
        title: Coupon
        model: {width: 25 mm, out of plane: {{{outOfPlane}}}, rotation: small}
        materials:
          steel: {young: 210 GPa, poisson: 0.3, expansion: 12e-6 1/K}
        layers:
          glue: {{{layer}}}
        adherends:
          lower: {of: steel, rectangle: {corner: [0 mm, 0 mm], size: [{{{length}}} mm, 6 mm]}}
          upper: {of: steel, rectangle: {corner: [0 mm, 6 mm], size: [{{{length}}} mm, 6 mm]}}
        joints:
          bond: {layer: glue, upper: bottom of upper, lower: top of lower, starter crack: {from: start, length: 40 mm}}
        grips:
        {{{grips}}}
        sequence:
        {{{sequence}}}
        keep: {fields: none}
        """);
}
