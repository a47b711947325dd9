using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Mechanics.Layers;
using InterfaceFE.Model;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>What the march says when a model cannot be marched: the part or the element, its place, what is wrong with it.</summary>
public class FaultWordsTests
{
    private const string FixAll = "  - fix: {base: [x, y, rotation], head: [x, rotation]}\n";
    private const string Pull = "  - pull: {grip: head, along: +y, travel: 0.04 mm}";

    [Theory]
    [InlineData("  - fix: {base: [x, rotation]}\n", "along y", "slides along y")]
    [InlineData("  - fix: {base: [y, rotation]}\n", "along x", "slides along x")]
    [InlineData("  - fix: {base: [x, y]}\n", "along", "turns about (3 mm, 0 mm)")]
    public void Specimen_that_is_not_supported_is_named_with_place_direction_and_usual_causes(string fix, string direction, string motion)
    {
        MarchOutcome outcome = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(fix + "  - heat to: 30 °C"))).Outcome;
        Assert.Equal(MarchStatus.StoppedEarly, outcome.Status);
        Says(outcome.Cause, " of ", " mm, ", "can still move freely " + direction, motion, "Usual causes", "fixed in the sequence");
    }

    [Fact]
    public void Part_that_hinges_on_one_point_while_the_rest_is_held_is_named_alone()
    {
        // The upper block has lost its joint and hangs on a pin at its end.
        Deck deck = DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], pin: [x, y]}\n  - heat to: 30 °C", moreGrips: "  pin: {on: right end of upper, at: 1 mm}")
            .Replace("  base: {on: bottom of lower}\n  head: {on: top of upper}", "  base: {on: bottom of lower}", StringComparison.Ordinal));
        SpecimenModel model = DeckOf.Model(deck);
        MarchOutcome outcome = March(WithLayers(model, []));
        Assert.Equal(MarchStatus.StoppedEarly, outcome.Status);
        Says(outcome.Cause, "the left end of upper", "can still move freely along y", "upper turns about (6 mm, 3 mm)", "held at one point alone");
        Assert.DoesNotContain("and with it lower", outcome.Cause, StringComparison.Ordinal);
    }

    [Fact]
    public void Joint_that_broke_through_and_left_a_part_free_ends_the_march_as_severed_and_is_named()
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixAll + "  - pull: {grip: head, along: +y, travel: 0.2 mm}\n  - let go: [head]\n  - heat to: 30 °C")));
        Assert.Equal(MarchStatus.Severed, run.Outcome.Status);
        Says(run.Outcome.Cause, "came apart in stage 2", "nothing is left of bond");
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Law_without_an_answer_stops_the_march_at_its_joint_and_place(bool tangentOnly)
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks(FixAll + Pull)));
        MarchOutcome outcome = March(WithLayers(model, [Layer(model, law => new WithoutAnswer(law, 0.004, tangentOnly))]));
        Assert.Equal(MarchStatus.StoppedEarly, outcome.Status);
        Says(outcome.Cause, "stage 2", "joint 'bond'", " mm along it (x = ", "y = 2 mm)", tangentOnly ? "the stiffness of the law is not finite" : "the peel traction is not finite", "at an opening of ");
    }

    [Fact]
    public void Law_without_an_answer_at_the_start_is_named_too()
    {
        SpecimenModel model = DeckOf.Model(DeckOf.Yaml(DeckOf.Blocks(FixAll + Pull)));
        MarchOutcome outcome = March(WithLayers(model, [Layer(model, law => new WithoutAnswer(law, -1, false))]));
        Says(outcome.Cause, "at the start", "joint 'bond'", "the peel traction is not finite");
    }

    [Fact]
    public void Load_beyond_all_measure_ends_in_words_and_not_in_numbers()
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation]}\n  - pull: {grip: head, along: +y, force: 1e300 N}")));
        Assert.Equal(MarchStatus.StoppedEarly, run.Outcome.Status);
        Says(run.Outcome.Cause, "progress 0", "numbers overflow", "along y", "a load beyond all measure");
        Assert.All(run.Points, p => Assert.True(double.IsFinite(p.Energy.State.Total) && double.IsFinite(p.Energy.PutIn)));
    }

    private static void Says(string cause, params string[] words)
    {
        foreach (string w in words)
            Assert.True(cause.Contains(w, StringComparison.Ordinal), $"'{w}' is not said: {cause}");
    }

    private static MarchOutcome March(SpecimenModel model) => new March(new FullEquilibrium(model), new MarchSettings(), new Silent()).Run(TestContext.Current.CancellationToken);

    private static LayerBlock Layer(SpecimenModel model, Func<ILayerLaw, ILayerLaw> wrap) =>
        new(model.Mesh, model.Mesh.Joints[0], wrap(model.Layers[0].Law), model.Layers[0].Thickness, LayerRule.SubIntervals(2), 0, model.StressFreeTemperature, bonded: true);

    private static SpecimenModel WithLayers(SpecimenModel model, IReadOnlyList<LayerBlock> layers) => new()
    {
        Mesh = model.Mesh,
        Unknowns = model.Unknowns,
        Solids = model.Solids,
        OpenFaces = model.OpenFaces,
        Layers = layers,
        Grips = model.Grips,
        Stages = model.Stages,
        StressFreeTemperature = model.StressFreeTemperature,
    };

    /// <summary>A law that answers NaN from an opening on.</summary>
    private sealed class WithoutAnswer(ILayerLaw inner, double from, bool tangentOnly) : WrappedLaw(inner)
    {
        public override LayerResponse Update(in Separation separation, in LawPoint at, ReadOnlySpan<double> accepted, Span<double> tentative)
        {
            LayerResponse answer = Inner.Update(separation, at, accepted, tentative);
            if (separation.Opening <= from)
                return answer;
            answer.PeelByOpening = double.NaN;
            if (!tangentOnly)
                answer.Peel = double.NaN;
            return answer;
        }
    }

    private sealed class Silent : IMarchObserver
    {
        public void PointAccepted(MarchPoint point)
        {
        }

        public void IterationMade(in MarchIteration iteration)
        {
        }

        public void Said(string line)
        {
        }
    }
}
