using InterfaceFE.Results;
using InterfaceFE.Runs;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>
/// Butt joint with the adhesive as a solid and a layer on each face, no lateral contraction: springs in series by hand, travel u = w + σ(w)·(2H/E + t/Ea + 1/k) with the opening w of the weaker face
/// and the stiffness k of the stronger, which stays elastic.
/// </summary>
public class ThickAdhesiveTests
{
    private const double Compliance = 2 * 3.0 / 1000 + 1.0 / 200 + 1.0 / 2000;

    [Fact]
    public void The_weaker_face_of_a_solid_adhesive_gives_and_the_rest_unloads()
    {
        RunResult run = DeckOf.Run(DeckOf.Yaml("""
            title: Butt joint with a thick adhesive
            model: {width: 2 mm, out of plane: free, rotation: small}
            materials:
              stuff: {young: 1 GPa, poisson: 0}
              adhesive: {young: 200 MPa, poisson: 0}
            layers:
              weak: {thickness: 0.1 mm, mixing: independent modes, peel: {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: 0.2 N/mm}, shear: {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: 0.2 N/mm}}
              strong: {thickness: 0.1 mm, mixing: independent modes, peel: {law: bilinear, stiffness: 2000 MPa/mm, strength: 8 MPa, toughness: 0.4 N/mm}, shear: {law: bilinear, stiffness: 2000 MPa/mm, strength: 8 MPa, toughness: 0.4 N/mm}}
            adherends:
              lower: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [6 mm, 3 mm]}, elements: {along: 3, through: 1}}
              paste: {of: adhesive, rectangle: {corner: [0 mm, 3 mm], size: [6 mm, 1 mm]}, elements: {along: 3, through: 1}}
              upper: {of: stuff, rectangle: {corner: [0 mm, 4 mm], size: [6 mm, 3 mm]}, elements: {along: 3, through: 1}}
            joints:
              lower face: {layer: strong, upper: bottom of paste, lower: top of lower, element length: 2 mm}
              upper face: {layer: weak, upper: bottom of upper, lower: top of paste, element length: 2 mm}
            grips:
              base: {on: bottom of lower}
              head: {on: top of upper}
            sequence:
              - fix: {base: [x, y, rotation], head: [x, rotation]}
              - pull: {grip: head, along: +y, travel: 0.12 mm}
            """));
        Assert.True(run.Summary.Status == RunStatus.Severed, run.Summary.Cause);
        int softening = 0;
        foreach (PointRow point in run.History.Points)
        {
            double traction = point.Grips[1].Force / 12, opening = point.Grips[1].Displacement - Compliance * traction;
            Close.To(opening <= 0.005 ? 1000 * opening : Math.Max(5 * (0.08 - opening) / 0.075, 0), traction, 1e-8, 1e-8, $"point {point.Point}");
            softening += opening > 0.005 ? 1 : 0;
        }
        Assert.True(softening > 3, $"{softening}");
        Close.To(0.2 * 12, run.History.Energies[^1].SpentInLayers, 1e-9, 0, "spent by the weaker face alone");
    }
}
