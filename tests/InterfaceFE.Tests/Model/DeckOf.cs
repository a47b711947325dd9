using InterfaceFE.Decks;
using InterfaceFE.Decks.Reading;
using InterfaceFE.Geometry;
using InterfaceFE.Model;
using InterfaceFE.Runs;
using Xunit;

namespace InterfaceFE.Tests.Model;

/// <summary>Decks, models and small specimens for tests, all invented.</summary>
internal static class DeckOf
{
    /// <summary>Layer with bilinear curves; the toughnesses differ so that tangents turn skew while it gives way.</summary>
    public const string IndependentGlue = """
        {thickness: 0.2 mm, peel: {law: bilinear, stiffness: 500 MPa/mm, strength: 5 MPa, toughness: 0.2 kJ/m^2},
            shear: {law: bilinear, stiffness: 300 MPa/mm, strength: 4 MPa, toughness: 0.5 kJ/m^2}, mixing: independent modes}
        """;

    /// <summary>As <see cref="IndependentGlue"/> with one damage variable.</summary>
    public const string OneDamageGlue = """
        {thickness: 0.2 mm, peel: {law: bilinear, stiffness: 500 MPa/mm, strength: 5 MPa, toughness: 0.2 kJ/m^2},
            shear: {law: bilinear, stiffness: 300 MPa/mm, strength: 4 MPa, toughness: 0.5 kJ/m^2}, mixing: benzeggagh-kenane, exponent: 2}
        """;

    /// <summary>Reads a deck that must be good.</summary>
    public static Deck Yaml(string text)
    {
        DeckReading reading = DeckReader.ReadText(text, "test.yaml");
        Assert.True(reading.Deck is not null, string.Join("\n", reading.Problems));
        return reading.Deck;
    }

    /// <summary>Mesh and model of a deck.</summary>
    public static SpecimenModel Model(Deck deck) => ModelBuilder.Build(deck, Mesher.Build(deck).Mesh);

    /// <summary>Runs a deck in memory.</summary>
    public static RunResult Run(Deck deck) => DeckRun.Execute(deck, null, TestContext.Current.CancellationToken);

    /// <summary>Two blocks of 6 mm × 2 mm, one on the other with a layer between; `base` holds the bottom, `head` the top.</summary>
    /// <param name="sequence">Stages, indented by two.</param>
    /// <param name="layer">The layer.</param>
    /// <param name="elements">Kind of element.</param>
    /// <param name="moreGrips">Further grips, indented by two.</param>
    /// <param name="more">Further top-level keys.</param>
    public static string Blocks(string sequence, string layer = IndependentGlue, string elements = "four-node", string moreGrips = "", string more = "") => $$$"""
        title: Two blocks and a layer
        model: {width: 2 mm, out of plane: free, rotation: small, elements: {{{elements}}}}
        materials:
          stuff: {young: 1 GPa, poisson: 0.3, expansion: 20e-6 1/K}
          other: {young: 2 GPa, poisson: 0.2, expansion: 50e-6 1/K}
        layers:
          glue: {{{layer}}}
        adherends:
          lower: {of: stuff, rectangle: {corner: [0 mm, 0 mm], size: [6 mm, 2 mm]}, elements: {along: 3, through: 2}}
          upper: {of: other, rectangle: {corner: [0 mm, 2 mm], size: [6 mm, 2 mm]}, elements: {along: 3, through: 2}}
        joints:
          bond: {layer: glue, upper: bottom of upper, lower: top of lower, element length: 2 mm}
        grips:
          base: {on: bottom of lower}
          head: {on: top of upper}
        {{{moreGrips}}}
        sequence:
        {{{sequence}}}
        {{{more}}}
        """;
}
