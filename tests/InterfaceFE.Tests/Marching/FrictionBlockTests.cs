using InterfaceFE.Results;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>
/// A rigid block pressed on a rigid panel with a dead force N and pushed to and fro. A sixth of the face keeps a bond that is as good as nothing in shear but takes its share of the pressure, so that
/// by hand: closing w from N = k·[A·(w - d/2) + a·w] (d the onset of contact), slip at F = μ·k·A·(w - d/2), sticking with k·A, a loop of half-width u spends 2·F·(2u - 2F/(k·A)).
/// </summary>
public class FrictionBlockTests
{
    private const double Press = 60, Coefficient = 0.3, Contact = 2000, Open = 50, Bonded = 10, Onset = 1e-4, Travel = 0.04;

    [Theory]
    [InlineData("four-node")]
    [InlineData("eight-node")]
    public void A_block_pushed_to_and_fro_closes_its_loop_and_spends_its_area(string elements)
    {
        double closing = (Press / Contact + 0.5 * Onset * Open) / (Open + Bonded), slip = Coefficient * Contact * Open * (closing - 0.5 * Onset);
        RunHistory history = DeckOf.Run(DeckOf.Yaml(Deck(elements))).History;
        PointRow[] points = [.. history.Points];
        EnergyRow[] energies = [.. history.Energies];
        int[] ends = [.. Enumerable.Range(3, 3).Select(stage => Array.FindLastIndex(points, p => p.Stage == stage))];
        for (int i = 0; i < 3; i++)
            Close.To((i == 1 ? -1 : 1) * slip, points[ends[i]].Grips[1].ForceX, 1e-4, 0, $"force {i}");
        Close.To(slip * (Travel - slip / (Contact * Open)), energies[ends[0]].SpentInFriction, 1e-3, 0, "first push");
        for (int i = 1; i < 3; i++)
            Close.To(2 * slip * (Travel - slip / (Contact * Open)), energies[ends[i]].SpentInFriction - energies[ends[i - 1]].SpentInFriction, 1e-3, 0, $"half a loop {i}");
        Close.To(energies[ends[0]].StoredInLayers, energies[ends[2]].StoredInLayers, 1e-7, 0, "closed loop");
        Close.To(energies[ends[2]].SpentInFriction - energies[ends[0]].SpentInFriction, energies[ends[2]].PutIn - energies[ends[0]].PutIn, 1e-3, 0, "work put in over the loop");
        Assert.True(energies.Max(e => e.Balance) < 1e-9 && energies.Max(e => e.PathError) < 1e-3, $"{energies.Max(e => e.Balance)} {energies.Max(e => e.PathError)}");
        Assert.All(energies, e => Assert.True(e.SpentInLayers == 0));
        Assert.All(history.Fronts, f => Assert.True(f.JPath is null && f.JRotation is null));
    }

    private static string Deck(string elements) => FormattableString.Invariant($$"""
        title: Block on a panel
        model: {width: 5 mm, out of plane: free, rotation: small, elements: {{elements}} }
        materials:
          rigid: {young: 70000 GPa, poisson: 0}
        layers:
          faces: {thickness: 0.1 mm, contact stiffness: {{Contact}} MPa/mm, friction: {{Coefficient}}, mixing: independent modes,
            peel: {law: bilinear, stiffness: 0.0001 MPa/mm, strength: 0.0001 MPa, toughness: 0.001 kJ/m^2}, shear: {law: bilinear, stiffness: 0.0001 MPa/mm, strength: 0.0001 MPa, toughness: 0.001 kJ/m^2} }
        adherends:
          panel: {of: rigid, rectangle: {corner: [0 mm, 0 mm], size: [12 mm, 2 mm]}, elements: {along: 6, through: 1} }
          block: {of: rigid, rectangle: {corner: [0 mm, 2 mm], size: [12 mm, 2 mm]}, elements: {along: 6, through: 1} }
        joints:
          face: {layer: faces, upper: bottom of block, lower: top of panel, starter crack: {from: start, length: 10 mm}, element length: 2 mm}
        grips:
          base: {on: bottom of panel}
          head: {on: top of block}
        sequence:
          - fix: {base: [x, y, rotation], head: [x, rotation]}
          - push: {grip: head, along: -y, force: {{Press}} N}
          - pull: {grip: head, along: +x, travel: {{Travel}} mm, counted from: stress-free state}
          - push: {grip: head, along: -x, travel: {{Travel}} mm, counted from: stress-free state}
          - pull: {grip: head, along: +x, travel: {{Travel}} mm, counted from: stress-free state}
        """);
}
