using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Marching;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>Two equal arms in flexure: long faces lie on each other at next to no pressure, with a stiff contact.</summary>
public class FacesInContactTests
{
    private const string Flexure = """
        title: End-notched flexure
        model: {width: 25.4 mm, out of plane: held, rotation: small}
        materials:
          arm: {young: {x: 122.7 GPa, y: 10.1 GPa, z: 10.1 GPa}, poisson: {xy: 0.25, xz: 0.25, zy: 0.45}, shear modulus: {xy: 5.5 GPa}}
        layers:
          matrix:
            {thickness: 0.01 mm, mixing: independent modes,
             peel: {law: bilinear, stiffness: 1e6 MPa/mm, strength: 80 MPa, toughness: 0.969 N/mm},
             shear: {law: bilinear, stiffness: 1e6 MPa/mm, strength: 100 MPa, toughness: 1.719 N/mm}}
        adherends:
          lower arm: {of: arm, rectangle: {corner: [0 mm, 0 mm], size: [122 mm, 1.56 mm]}}
          upper arm: {of: arm, rectangle: {corner: [0 mm, 1.56 mm], size: [122 mm, 1.56 mm]}}
        joints:
          bond: {layer: matrix, upper: bottom of upper arm, lower: top of lower arm, starter crack: {from: start, length: 49.3 mm}, element length: LENGTH mm}
        grips:
          left support: {on: bottom of lower arm, at: 10 mm}
          right support: {on: bottom of lower arm, at: 112 mm}
          pin: {on: top of upper arm, at: 61 mm}
        sequence:
          - fix: {left support: [x, y], right support: [y]}
          - push: {grip: pin, along: -y, travel: 0.2 mm}
        """;

    [Theory]
    [InlineData("0.18")]
    [InlineData("0.06")]
    public void Flexure_of_two_arms_marches_from_zero_load_without_a_stride_shortened(string elementLength)
    {
        DeckReading reading = DeckReader.ReadText(Flexure.Replace("LENGTH", elementLength, StringComparison.Ordinal), "flexure");
        Recording run = Recording.Of(reading.Deck!);
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        Assert.Equal(0, run.Iterations.Max(i => i.Retries));
    }
}
