namespace InterfaceFE.Tests.Cli;

/// <summary>A bar across a layer, as text: two blocks that are pulled apart. Runs in well under a second without figures.</summary>
internal static class TinyDeck
{
    /// <summary>The deck.</summary>
    /// <param name="march">Entries of `march`.</param>
    /// <param name="height">Height of each block [mm]; tall ones store enough to snap back.</param>
    /// <param name="starterCrack">Entries of `starter crack`; empty for none.</param>
    public static string Text(string march = "most points: 500", int height = 5, string starterCrack = "") => $$$"""
        title: Bar across a layer
        model: {width: 2.5 mm, out of plane: free, rotation: small}
        materials: {stuff: {young: 1000 MPa, poisson: 0}}
        layers:
          glue:
            thickness: 0.2 mm
            peel:  {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: 0.2 kJ/m^2}
            shear: {law: bilinear, stiffness: 1000 MPa/mm, strength: 5 MPa, toughness: 0.2 kJ/m^2}
            mixing: independent modes
        adherends:
          lower: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [4 mm, {{{height}}} mm]}, elements: {along: 2, through: 2}}
          upper: {of: stuff, rectangle: {corner: [0 mm, {{{height}}} mm], size: [4 mm, {{{height}}} mm]}, elements: {along: 2, through: 2}}
        joints:
          bond: {layer: glue, upper: bottom of upper, lower: top of lower, element length: 2 mm{{{(starterCrack.Length > 0 ? $", starter crack: {{{starterCrack}}}" : "")}}}}
        grips: {base: {on: bottom of lower}, head: {on: top of upper}}
        sequence:
          - fix: {base: [x, y, rotation], head: [x, rotation]}
          - pull: {grip: head, along: +y, travel: 0.1 mm}
        keep: {curves of: [head], fields: every 10 points}
        march: {{{{march}}}}
        """;
}
