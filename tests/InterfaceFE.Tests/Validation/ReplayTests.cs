using InterfaceFE.Decks;
using InterfaceFE.Marching;
using InterfaceFE.Results;
using InterfaceFE.Tests.Marching;
using InterfaceFE.Tests.Model;
using InterfaceFE.Tests.Results;
using InterfaceFE.Validation.Replays;
using Xunit;

namespace InterfaceFE.Tests.Validation;

/// <summary>A run and its replays, compared by their tables.</summary>
public class ReplayTests
{
    private const string FixAll = "  - fix: {base: [x, y, rotation], head: [x, rotation]}\n";

    public static TheoryData<string> Decks { get; } = ["snap-back", "snap-back by arc length", "snap-back by force", "heat, then pull", "one damage variable"];

    [Theory]
    [MemberData(nameof(Decks))]
    public void Replay_gives_the_same_bytes_and_its_own_replay_gives_all_of_them(string name)
    {
        using TemporaryFolder temporary = new();
        Deck deck = DeckCalled(name);
        string run = temporary.File("run"), first = temporary.File("first"), second = temporary.File("second");
        RunSummary original = TableFolder.Make(deck, run, replay: null);
        Assert.NotEqual(RunStatus.Interrupted, original.Status);
        RunSummary replayed = TableFolder.Make(deck, first, Plan(run));
        Assert.Equal(original.Status, replayed.Status);
        foreach (string table in (string[])["grips.csv", "front.csv", "energy.csv"])
            Assert.Equal(Text(run, table), Text(first, table));
        Assert.Equal(0, TableComparison.Compare("convergence.csv", Text(run, "convergence.csv"), Text(first, "convergence.csv"), 1).Relative);
        TableFolder.Make(deck, second, Plan(first));
        foreach (string table in TableComparison.Tables)
            Assert.Equal(Text(first, table), Text(second, table));
        // Searches that failed are not made again.
        Assert.True(replayed.Counts["iterations"] <= original.Counts["iterations"]);
    }

    [Fact]
    public void Searches_carried_on_move_nothing_beyond_the_tolerance()
    {
        using TemporaryFolder temporary = new();
        Deck deck = DeckCalled("snap-back");
        TableFolder.Make(deck, temporary.File("run"), replay: null);
        RunSummary deep = TableFolder.Make(deck, temporary.File("deep"), Plan(temporary.File("run")).Deeper(2));
        TableDifference difference = TableComparison.Compare("grips.csv", Text(temporary.File("run"), "grips.csv"), Text(temporary.File("deep"), "grips.csv"), 50);
        Assert.True(difference.Relative < 1e-7, difference.ToString());
        Assert.True(deep.Counts["iterations"] >= 2 * (deep.Counts["points"] - 1));
    }

    [Fact]
    public void Search_that_passed_the_end_of_a_stage_is_followed_by_the_one_that_found_the_end()
    {
        Deck deck = BarDeck.Make(0.1);
        Recording plain = Recording.Of(deck);
        Assert.Equal(MarchStatus.Finished, plain.Outcome.Status);
        RecordedPoint start = new(2, 1, 0, [new RecordedSearch(OwnControl.Label, 0.5, 0, 0.5, 1, 1e-12)]);
        double layerWork = 0.5 * plain.Points[^1].Energy.State.StoredInLayers;
        // From half the travel, where a quarter of the layer's work is done, by as much as leads past the whole of it; the end is a share of the way back.
        RecordedPoint end = new(2, 2, 0, [new RecordedSearch(LayerWorkControl.Label, 3 * layerWork, 1, 1.3, 5, 1e-12), new RecordedSearch(OwnControl.Label, 0.5, 0.6, 1, 2, 1e-12)]);
        Recording replayed = Recording.Of(deck, replay: new ReplayPlan([start, end]));
        Assert.True(replayed.Outcome.Status == MarchStatus.Finished, replayed.Outcome.Cause);
        Assert.Equal(1, replayed.Points[^1].Progress);
        double scale = plain.Displacements[^1].Max(Math.Abs);
        for (int i = 0; i < plain.Displacements[^1].Length; i++)
            Close.To(plain.Displacements[^1][i], replayed.Displacements[^1][i], 0, 1e-9 * scale);
        Assert.Single(replayed.Iterations, i => i.Newton.Reason == IterationReason.PastEnd);
    }

    [Fact]
    public void Point_that_is_not_reached_stops_the_replay_with_its_number_and_what_differed()
    {
        Deck deck = DeckCalled("snap-back");
        using TemporaryFolder temporary = new();
        TableFolder.Make(deck, temporary.File("run"), replay: null);
        // A layer of a tenth of the toughness can never have the recorded work.
        CurveDeck brittle = deck.Layers!["glue"].Peel! with { Toughness = 0.02 };
        Deck other = deck with { Layers = new Dictionary<string, LayerDeck> { ["glue"] = deck.Layers["glue"] with { Peel = brittle, Shear = brittle } } };
        RunSummary summary = TableFolder.Make(other, temporary.File("other"), Plan(temporary.File("run")));
        Assert.Equal(RunStatus.StoppedEarly, summary.Status);
        Assert.Matches("point [0-9]+ of the record is not reached .*out of balance.* after [0-9]+ iterations, where the recorded run came to .* after [0-9]+", summary.Cause);
        Assert.True(Text(temporary.File("other"), "grips.csv").Split('\n').Length > 3, "points before it are kept");
    }

    [Fact]
    public void Record_that_breaks_off_is_followed_to_its_last_whole_point()
    {
        using TemporaryFolder temporary = new();
        Deck deck = DeckCalled("snap-back");
        TableFolder.Make(deck, temporary.File("run"), replay: null);
        string text = Text(temporary.File("run"), "convergence.csv");
        // Within the last row of point 7, which is then no point of the record.
        int cut = text.LastIndexOf("\n2,7,", StringComparison.Ordinal) + 12;
        RunSummary summary = TableFolder.Make(deck, temporary.File("part"), ReplayReader.Read(text[..cut]));
        Assert.Equal(RunStatus.StoppedEarly, summary.Status);
        Assert.Contains("the record that is replayed ends here", summary.Cause, StringComparison.Ordinal);
        Assert.Equal(7, summary.Counts["points"]);
        Assert.StartsWith(Text(temporary.File("part"), "grips.csv"), Text(temporary.File("run"), "grips.csv"), StringComparison.Ordinal);
    }

    [Fact]
    public void Comparison_measures_a_difference_by_its_column_and_what_is_zero_by_what_is_not()
    {
        const string Header = "point,opening [mm],sliding [mm],reaction [N],name\r\n";
        TableDifference difference = TableComparison.Compare("front.csv", Header + "0,2,1e-17,1e-9,a\r\n1,4,0,0,a\r\n", Header + "0,2.000001,3e-17,4e-9,a\r\n1,4,0,0,a\r\n", 100);
        Close.To(0.25e-6, difference.Relative, 1e-6);
        Assert.StartsWith("opening [mm], row 1", difference.Where, StringComparison.Ordinal);
        foreach (string other in (string[])["0,2,1e-17,1e-9,b\r\n1,4,0,0,a\r\n", "0,2,,1e-9,a\r\n1,4,0,0,a\r\n", "0,2,1e-17,1e-9,a\r\n", "0,2,NaN,1e-9,a\r\n1,4,0,0,a\r\n"])
            Assert.Equal(double.PositiveInfinity, TableComparison.Compare("front.csv", Header + "0,2,1e-17,1e-9,a\r\n1,4,0,0,a\r\n", Header + other, 100).Relative);
    }

    private static ReplayPlan Plan(string folder) => ReplayReader.Read(Text(folder, "convergence.csv"));

    private static string Text(string folder, string table) => File.ReadAllText(Path.Join(folder, table));

    private static Deck DeckCalled(string name) => name switch
    {
        "snap-back" => BarDeck.Make(0.6),
        "snap-back by arc length" => BarDeck.Make(0.6, control: ControlSetting.ArcLength),
        "snap-back by force" => DeckOf.Yaml(DeckOf.Blocks("  - fix: {base: [x, y, rotation], head: [x, rotation]}\n  - pull: {grip: head, along: +y, force: 80 N}")),
        "heat, then pull" => DeckOf.Yaml(DeckOf.Blocks(FixAll + "  - heat to: 60 °C\n  - pull: {grip: head, along: +y, travel: 0.05 mm}\n  - push: {grip: head, along: -y, travel: 0.02 mm}")),
        _ => DeckOf.Yaml(DeckOf.Blocks(FixAll + "  - pull: {grip: head, along: +y, travel: 0.05 mm}\n  - pull: {grip: head, along: +y, travel: 0.1 mm}", DeckOf.OneDamageGlue)),
    };
}
