using InterfaceFE.Decks.Reading;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Validation;

/// <summary>A slender specimen that travels far: its forces cancel to many digits, and a wrong travel hides behind small forces out of balance.</summary>
public class SlenderBalanceTests
{
    private const string Text = """
        title: Slender arms turned by uneven couples
        model: {width: 25 mm, out of plane: free, rotation: small}
        materials:
          metal: {young: 70000 MPa, poisson: 0.3}
        layers:
          glue:
            thickness: 0.2 mm
            peel: {law: bilinear, stiffness: 3300 MPa/mm, strength: 20 MPa, toughness: 1 kJ/m^2}
            shear: {law: bilinear, stiffness: 1800 MPa/mm, strength: 25 MPa, toughness: 1 kJ/m^2}
            mixing: independent modes
        adherends:
          lower arm: {of: metal, rectangle: {corner: [0 mm, 0 mm], size: [170 mm, 3 mm]}}
          upper arm: {of: metal, rectangle: {corner: [0 mm, 3 mm], size: [170 mm, 3 mm]}}
        joints:
          bond: {layer: glue, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: 20 mm}}
        grips:
          upper: {on: left end of upper arm}
          lower: {on: left end of lower arm}
          root: {on: right end of lower arm}
        sequence:
          - fix: {root: [x, y, rotation]}
          - turn: {grips: {upper: -1, lower: -0.8}, moment: 3000 N*mm}
        """;

    [Fact]
    public void Elastic_points_of_a_slender_specimen_balance_to_round_off()
    {
        RunResult run = DeckRun.Execute(DeckReader.ReadText(Text, "slender").Deck!, cancellation: TestContext.Current.CancellationToken);
        Assert.True(run.History.Points.Count > 1);
        // 1.1e-9 before forces were freed of rigid movement and points polished.
        Close.To(0, run.History.Energies.Max(e => e.Balance), absolute: 2e-10, what: "balance");
        Close.To(0, run.History.Energies.Max(e => e.PathError), absolute: 2e-10, what: "path error of a linear stage");
    }
}
