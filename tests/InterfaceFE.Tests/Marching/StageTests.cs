using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Model;
using InterfaceFE.Tests.Model;
using Xunit;

namespace InterfaceFE.Tests.Marching;

/// <summary>What the stages of a sequence do, against linear superposition.</summary>
public class StageTests
{
    private const string Side = "  side: {on: right end of upper, at: 1 mm}";
    private const string FixBase = "  - fix: {base: [x, y, rotation]}\n";

    [Fact]
    public void Reaction_of_a_grip_let_go_fades_linearly_and_leaves_what_was_never_held()
    {
        Recording held = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - fix: {side: [x, y]}\n  - pull: {grip: head, along: +y, force: 2 N}\n  - let go: [side]", moreGrips: Side)));
        Recording free = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, force: 2 N}", moreGrips: Side)));
        Assert.Equal((MarchStatus.Finished, MarchStatus.Finished), (held.Outcome.Status, free.Outcome.Status));
        UnknownMap map = held.Equilibrium.Model.Unknowns;
        int unknown = map.OfNode(map.Bodies[^1].Nodes[0]) + 1;
        double start = held.Forces[held.Points.FindLastIndex(p => p.Stage == 3)][unknown];
        Assert.True(Math.Abs(start) > 0.1, $"the side must carry something to let go of: {start}");
        int checkedPoints = 0;
        for (int i = 0; i < held.Points.Count; i++)
        {
            if (held.Points[i].Stage != 4)
                continue;
            Close.To(start * (1 - held.Points[i].Progress), held.Forces[i][unknown], 1e-9, 1e-9 * Math.Abs(start));
            checkedPoints++;
        }
        Assert.True(checkedPoints > 3);
        double scale = free.Displacements[^1].Max(Math.Abs);
        for (int i = 0; i < map.Count; i++)
            Close.To(free.Displacements[^1][i], held.Displacements[^1][i], 0, 1e-9 * scale);
        Assert.True(held.Points[^1].Energy.Balance < 1e-9 && held.Points[^1].Energy.PathError < 1e-9, held.Points[^1].Energy.ToString());
    }

    [Fact]
    public void Pull_by_travel_and_by_force_meet_and_push_is_the_pull_of_the_other_sense()
    {
        Recording byTravel = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, travel: 0.004 mm}")));
        int head = byTravel.Equilibrium.Model.Unknowns.OfBody(1) + 1;
        double force = byTravel.Forces[^1][head];
        Recording byForce = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + Text($"  - pull: {{grip: head, along: +y, force: {force:R} N}}"))));
        Recording pushed = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - push: {grip: head, along: -y, travel: 0.004 mm}")));
        Recording pushedByForce = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + Text($"  - push: {{grip: head, along: -y, force: {force:R} N}}"))));
        double scale = byTravel.Displacements[^1].Max(Math.Abs);
        for (int i = 0; i < byTravel.Displacements[^1].Length; i++)
        {
            Close.To(byTravel.Displacements[^1][i], byForce.Displacements[^1][i], 0, 1e-8 * scale);
            Close.To(-byTravel.Displacements[^1][i], pushed.Displacements[^1][i], 0, 1e-8 * scale);
            Close.To(-byTravel.Displacements[^1][i], pushedByForce.Displacements[^1][i], 0, 1e-8 * scale);
        }
    }

    [Fact]
    public void Turn_by_angle_and_by_moment_meet_and_shares_scale()
    {
        Recording byAngle = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - turn: {grips: {head: -0.5}, angle: 0.001 rad}")));
        int head = byAngle.Equilibrium.Model.Unknowns.OfBody(1);
        Close.To(-0.0005, byAngle.Displacements[^1][head + 2], 1e-12);
        double moment = byAngle.Forces[^1][head + 2];
        Assert.True(moment < 0);
        Recording byMoment = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + Text($"  - turn: {{grips: {{head: -2}}, moment: {-moment / 2:R} N*mm}}"))));
        double scale = byAngle.Displacements[^1].Max(Math.Abs);
        for (int i = 0; i < byAngle.Displacements[^1].Length; i++)
            Close.To(byAngle.Displacements[^1][i], byMoment.Displacements[^1][i], 0, 1e-8 * scale);
    }

    [Theory]
    [InlineData("start of this stage", 0.001)]
    [InlineData("stress-free state", 0)]
    public void Travel_is_counted_from_where_the_deck_says(string origin, double before)
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + $"  - pull: {{grip: head, along: +y, travel: 0.001 mm}}\n  - pull: {{grip: head, along: +y, travel: 0.003 mm, counted from: {origin}}}")));
        Close.To(before + 0.003, run.Displacements[^1][run.Equilibrium.Model.Unknowns.OfBody(1) + 1], 1e-12);
    }

    [Fact]
    public void A_force_stays_on_while_other_stages_run_and_stages_keep_their_numbers()
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, force: 1.5 N}\n  - heat to: 40 °C\n    over: 30 s\n  - wait: 1 min\n  - pull: {grip: head, along: +x, travel: 0.001 mm}")));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        int head = run.Equilibrium.Model.Unknowns.OfBody(1);
        for (int i = 0; i < run.Points.Count; i++)
            if (run.Points[i].Stage > 2)
                Close.To(1.5, run.Forces[i][head + 1], 1e-9, 0, $"point {i}");
        Assert.Equal([0, 2, 3, 4, 5], run.Points.Select(p => p.Stage).Distinct());
        Assert.Equal(5, run.Points.Count(p => p.StageEnd));
        Close.To(313.15, run.Points[^1].Temperature, 1e-12);
        // 60 s by force (default), 30 s of heating, 60 s of waiting, 0.001 mm at 1 mm/min.
        Close.To(60 + 30 + 60 + 0.06, run.Points[^1].Time, 1e-12);
        int waitStart = run.Points.FindLastIndex(p => p.Stage == 3), waitEnd = run.Points.FindLastIndex(p => p.Stage == 4);
        Assert.Equal(run.Displacements[waitStart], run.Displacements[waitEnd]);
    }

    [Fact]
    public void A_loaded_grip_that_is_fixed_and_let_go_gives_its_load_back()
    {
        Recording run = Recording.Of(DeckOf.Yaml(DeckOf.Blocks(FixBase + "  - pull: {grip: head, along: +y, force: 1.5 N}\n  - fix: {head: [y]}\n  - wait: 1 s\n  - let go: [head]")));
        Assert.True(run.Outcome.Status == MarchStatus.Finished, run.Outcome.Cause);
        int head = run.Equilibrium.Model.Unknowns.OfBody(1);
        Close.To(1.5, run.Forces[run.Points.FindLastIndex(p => p.Stage == 4)][head + 1], 1e-9);
        double scale = run.Displacements[run.Points.FindLastIndex(p => p.Stage == 4)].Max(Math.Abs);
        foreach (double value in run.Displacements[^1])
            Close.To(0, value, 0, 1e-9 * scale);
        EnergyAccount energy = run.Points[^1].Energy;
        Close.To(0, energy.PutIn, 0, 1e-9 * 1.5 * scale);
        Assert.True(energy.Balance < 1e-9 && energy.PathError < 1e-9, energy.ToString());
    }

    [Theory]
    [InlineData("  - pull: {grip: sides, along: +x, travel: 1 mm}", "several")]
    [InlineData("  - turn: {grips: {side: 1}, angle: 1 deg}", "rotation")]
    [InlineData("  - fix: {side: [rotation]}", "rotation")]
    public void What_a_grip_cannot_do_is_refused_with_place_and_reason(string stage, string words)
    {
        string text = DeckOf.Blocks(FixBase + stage, moreGrips: Side + "\n  sides: {on: [left end of upper, right end of upper], hold: each point}").Replace("  head: {on: top of upper}", "  head: {on: top of upper, at: middle}", StringComparison.Ordinal);
        InterfaceFE.Decks.Reading.DeckReading reading = InterfaceFE.Decks.Reading.DeckReader.ReadText(text, "test.yaml");
        string message = reading.Deck is { } deck ? Assert.Throws<DeckException>(() => DeckOf.Model(deck)).Message : string.Join("\n", reading.Problems);
        Assert.Contains("sequence.2", message, StringComparison.Ordinal);
        Assert.Contains(words, message, StringComparison.Ordinal);
    }

    private static string Text(FormattableString text) => FormattableString.Invariant(text);
}
