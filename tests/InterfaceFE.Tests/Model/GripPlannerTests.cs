using InterfaceFE.Decks;
using InterfaceFE.Geometry;
using InterfaceFE.Model;
using Xunit;

namespace InterfaceFE.Tests.Model;

public class GripPlannerTests
{
    [Fact]
    public void A_pin_is_the_point_nearest_to_its_place()
    {
        (IReadOnlyList<GripBody> bodies, Mesh mesh) = Plan("  pin: {on: right end of upper, at: start}");
        GripBody pin = bodies[2];
        Assert.False(pin.Rigid);
        Assert.Equal((6.0, 2.0), (mesh.X[Assert.Single(pin.Nodes)], mesh.Y[pin.Nodes[0]]));
    }

    [Fact]
    public void A_stretch_is_one_rigid_body_with_its_pin_in_the_middle()
    {
        (IReadOnlyList<GripBody> bodies, Mesh mesh) = Plan("  block: {on: left end of lower, from: 1 mm, to: 2 mm}", "base: {on: right end of lower}");
        GripBody block = bodies[2];
        Assert.True(block.Rigid);
        Assert.Equal((0.0, 1.5), (block.PinX, block.PinY));
        Assert.Equal(1.0, mesh.Y[block.Nodes[0]]);
        Assert.Equal(2.0, mesh.Y[block.Nodes[^1]]);
    }

    [Fact]
    public void Grips_on_the_same_place_share_a_body_and_several_edges_are_a_body_each()
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s", moreGrips: "  again: {on: bottom of lower}\n  both: {on: [bottom of lower, top of upper]}"));
        (IReadOnlyList<GripBody> bodies, IReadOnlyList<Grip> grips) = GripPlanner.Plan(deck, Mesher.Build(deck).Mesh);
        Assert.Equal(2, bodies.Count);
        Assert.Equal([0], grips.First(g => g.Name == "again").Bodies);
        Assert.Equal([0, 1], grips.First(g => g.Name == "both").Bodies);
    }

    [Theory]
    [InlineData("  side: {on: left end of lower}", "grips.side.on", "rigid")]
    [InlineData("  pin: {on: bottom of lower, at: 2 mm}", "grips.pin.on", "each point")]
    [InlineData("  block: {on: bottom of lower, pin: [0 mm, 0 mm]}", "grips.block.on", "same pin")]
    [InlineData("  pin: {on: left end of upper, at: 2.5 mm}", "grips.pin.at", "2 mm long")]
    [InlineData("  block: {on: left end of upper, from: 0 mm, to: 3 mm}", "grips.block.to", "3 mm")]
    [InlineData("  pin: {on: front of upper, at: start}", "grips.pin.on", "front")]
    public void Places_that_cannot_be_are_refused_with_key_and_reason(string grip, string path, string words)
    {
        DeckException fault = Assert.Throws<DeckException>(() => DeckOf.Model(Unchecked(grip)));
        Assert.Contains(path, fault.Problems[0].Path, StringComparison.Ordinal);
        Assert.Contains(words, fault.Problems[0].Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Points_may_overlap_points_and_be_fixed_each()
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - fix: {edge: [x]}\n  - wait: 1 s", moreGrips: "  edge: {on: left end of upper, from: 0 mm, to: 1 mm, hold: each point}\n  pin: {on: left end of upper, at: 1 mm}"));
        SpecimenModel model = DeckOf.Model(deck);
        Grip edge = model.Grips.First(g => g.Name == "edge");
        GripBody body = model.Unknowns.Bodies[edge.Bodies[0]];
        Assert.False(body.Rigid);
        Assert.Contains(model.Unknowns.Bodies[^1].Nodes[0], body.Nodes);
        Assert.Equal([.. body.Nodes.Select(n => model.Unknowns.OfNode(n)).Order()], model.Stages[0].Held.Select(h => h.Unknown));
    }

    private static (IReadOnlyList<GripBody> Bodies, Mesh Mesh) Plan(string grip, string lowerGrip = "base: {on: bottom of lower}")
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s", moreGrips: grip).Replace("base: {on: bottom of lower}", lowerGrip, StringComparison.Ordinal));
        Mesh mesh = Mesher.Build(deck).Mesh;
        return (GripPlanner.Plan(deck, mesh).Bodies, mesh);
    }

    /// <summary>A deck whose grip the reader may refuse already: the planner must hold on its own.</summary>
    private static Deck Unchecked(string grip)
    {
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - wait: 1 s"));
        string name = grip[2..grip.IndexOf(':', StringComparison.Ordinal)];
        string full = DeckOf.Blocks("  - wait: 1 s", moreGrips: grip);
        InterfaceFE.Decks.Reading.DeckReading reading = InterfaceFE.Decks.Reading.DeckReader.ReadText(full, "test.yaml");
        if (reading.Deck is not null)
            return reading.Deck;
        GripDeck own = grip.Contains("front", StringComparison.Ordinal)
            ? new GripDeck { On = ["front of upper"], At = new EdgePoint(0, double.NaN) }
            : throw new InvalidOperationException(string.Join("\n", reading.Problems));
        return deck with { Grips = new Dictionary<string, GripDeck>(deck.Grips) { [name] = own } };
    }
}
